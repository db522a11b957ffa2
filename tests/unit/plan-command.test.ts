import { spawn } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { planCommand } from '../../server/bin/planCommand';
import { planOutcome, type MadePlan, type NoPlan } from '../../shared/contracts/plan';
import { readProductionFile } from '../../shared/file/read';
import { writeProductionFile } from '../../shared/file/write';
import { effectivePasses } from '../../shared/planner/derive';
import { checkPlan } from '../../shared/solver/check/check';
import { aPass, emptyProduction, hours } from '../factories/bare-production';

const STARTING = readdirSync('templates/productions').map((name) => path.join('templates/productions', name));
const MALFORMED = readdirSync('tests/fixtures/malformed').map((name) => path.join('tests/fixtures/malformed', name));

let folder: string;
beforeAll(() => (folder = mkdtempSync(path.join(os.tmpdir(), 'plan-'))));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function written(name: string, content: string | Uint8Array): string {
  const place = path.join(folder, name);
  writeFileSync(place, content);
  return place;
}

/** The command as a process of its own. */
function run(args: string[], cwd = process.cwd()): Promise<{ status: number | null; out: string; err: string }> {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, [path.resolve('server/bin/plan.mjs'), ...args], { cwd });
    let out = '';
    let err = '';
    child.stdout.on('data', (chunk: Buffer) => (out += chunk.toString()));
    child.stderr.on('data', (chunk: Buffer) => (err += chunk.toString()));
    child.on('close', (status) => resolve({ status, out, err }));
  });
}
/** The command within this process: as the one above, without the time that a process takes to start. */
async function call(...args: string[]): Promise<{ status: number; out: string; err: string[] }> {
  const out: string[] = [];
  const err: string[] = [];
  const status = await planCommand(args, process.cwd(), { answer: (text) => out.push(text), complain: (line) => err.push(line) });
  return { status, out: out.join('\n'), err };
}

describe('the plan command', { timeout: 60_000 }, () => {
  it.each(STARTING)('plans %s, twice the same with the same seed and iterations', async (file) => {
    const args = [file, '--seed', '3', '--iterations', '40'];
    const first = await run(args);
    expect(first).toMatchObject({ status: 0, err: '' });
    const outcome = planOutcome.parse(JSON.parse(first.out)) as MadePlan;
    const read = readProductionFile(readFileSync(file, 'utf8'));
    if (!read.ok) throw new Error('the starting production is wrong');
    expect(checkPlan({ ...read.file, passes: effectivePasses(read.file) }, outcome).violations).toEqual([]);
    expect(outcome.bound).toBeLessThanOrEqual(outcome.cost.total);
    const again = JSON.parse((await call(...args)).out) as MadePlan;
    expect({ ...again, seconds: 0 }).toEqual({ ...outcome, seconds: 0 });
  });

  it('prints one JSON object on one line, its fields in the order of the format', async () => {
    const { out } = await call(STARTING[0]!, '--iterations', '1');
    expect(out.split('\n')).toHaveLength(1);
    const fields = ['status', 'cost', 'bound', 'seconds', 'items', 'calls', 'unplaced', 'odds', 'conflicts'];
    expect(Object.keys(JSON.parse(out) as object)).toEqual(fields);
  });

  it('exits 3 for what is impossible and names the facts that clash', async () => {
    const file = emptyProduction([aPass('horns', { people: ['lys'], minutes: 75 })]);
    file.people[2]!.windows = [hours('09', '13:00', '14:00')];
    const { status, out } = await run([written('impossible.yaml', writeProductionFile(file))]);
    expect(status).toBe(3);
    const outcome = planOutcome.parse(JSON.parse(out)) as NoPlan;
    expect(outcome).toMatchObject({ status: 'impossible', cost: null, bound: null, items: [], calls: [], odds: null });
    expect(outcome.conflicts.map(({ facts }) => facts)).toEqual([['passes.horns', 'people.lys.windows']]);
    expect(outcome.conflicts[0]!.says).toContain('Lys Marrow is free only Tue 9 March 13:00–14:00');
  });

  it('exits 3 for a ring and names it', async () => {
    const file = emptyProduction([aPass('x', { after: [{ pass: 'y' }] }), aPass('y', { after: [{ pass: 'x' }] })]);
    const { status, out } = await call(written('ring.yaml', writeProductionFile(file)));
    expect(status).toBe(3);
    expect((JSON.parse(out) as NoPlan).conflicts[0]!.facts).toEqual(['passes.x.after', 'passes.y.after']);
  });

  it('exits 4 where it finds no plan and proves nothing', async () => {
    // However these are shared out over three days of 600 minutes, one is left over, though their sum would fit.
    const file = emptyProduction([400, 400, 250, 250, 250, 200].map((minutes, i) => aPass(`x${i}`, { minutes })));
    const { status, out } = await call(written('unsolved.yaml', writeProductionFile(file)), '--iterations', '20');
    expect(status).toBe(4);
    expect(JSON.parse(out)).toMatchObject({ status: 'unsolved', cost: null, bound: null, items: [], calls: [], odds: null, conflicts: [] });
  });

  it('keeps to its time limit', async () => {
    const { out } = await run([STARTING[0]!, '--seconds', '2']);
    // A quiet machine keeps to it within 0.2 s; here other tests take their share of the processor.
    expect((JSON.parse(out) as MadePlan).seconds).toBeLessThan(3.5);
    expect((JSON.parse(out) as MadePlan).seconds).toBeGreaterThan(1);
  });

  it('does without a limit of time where iterations limit it', async () => {
    const slow = await call(STARTING[0]!, '--iterations', '30', '--seconds', '60');
    const free = await call(STARTING[0]!, '--iterations', '30');
    expect({ ...(JSON.parse(free.out) as MadePlan), seconds: 0 }).toEqual({ ...(JSON.parse(slow.out) as MadePlan), seconds: 0 });
  });

  it('sees the file from where the command was typed', async () => {
    written('seen.yaml', writeProductionFile(emptyProduction([aPass('x')])));
    expect(await run(['seen.yaml', '--iterations', '5'], folder)).toMatchObject({ status: 0, err: '' });
  });
});

describe('a file that is wrong', { timeout: 60_000 }, () => {
  it.each(MALFORMED)('%s exits 2 and says each fault with its line', async (file) => {
    const { status, out, err } = await call(file);
    expect(status).toBe(2);
    expect(out).toBe('');
    expect(err.length).toBeGreaterThan(0);
    for (const line of err) {
      expect(line.startsWith(`${file}:`)).toBe(true);
      expect(line.slice(file.length)).toMatch(/^:\d+: \S.*: .*\S$/);
      expect(line).not.toMatch(/\bat .*\.ts:\d+|undefined|\[object/);
    }
  });

  it.each([
    ['is not there', () => path.join(folder, 'nowhere.yaml'), 'a file that exists'],
    ['is a folder', () => folder, 'a file, not a folder'],
    ['is of 20 MB', () => written('large.yaml', 'a'.repeat(20 * 1024 * 1024)), 'a file of at most 5 MB'],
    ['is no text', () => written('picture.yaml', new Uint8Array([0xff, 0xd8, 0xff, 0xe0])), 'text in UTF-8'],
    ['is empty', () => written('empty.yaml', ''), 'a production file: a mapping that begins with `redpoll: 1`'],
  ])('exits 2 when it %s', async (_name, make, expected) => {
    const place = make();
    const { status, out, err } = await run([place]);
    expect({ status, out }).toEqual({ status: 2, out: '' });
    expect(err).toBe(`${place}:1: file: ${expected}\n`);
  });

  it('tells warnings and plans all the same', async () => {
    const text = `${writeProductionFile(emptyProduction([aPass('x')]))}\nmood: blue\n`;
    const { status, out, err } = await call(written('mood.yaml', text), '--iterations', '5');
    expect(status).toBe(0);
    expect(err).toEqual([expect.stringMatching(/mood\.yaml:\d+: mood: warning: a known field; this one is kept as it is$/)]);
    expect(JSON.parse(out)).toMatchObject({ unplaced: [] });
  });
});

describe('arguments that are wrong', () => {
  it.each([
    [[], 'a file is missing'],
    [['a.yaml', 'b.yaml'], 'one file at a time, not 2'],
    [['a.yaml', '--loud'], "Unknown option '--loud'"],
    [['a.yaml', '--seconds'], "Option '--seconds <value>' argument missing"],
    [['a.yaml', '--seconds', 'soon'], '--seconds wants a number from 0 to 86400, not soon'],
    [['a.yaml', '--iterations', '0'], '--iterations wants a whole number of at least 1, not 0'],
    [['a.yaml', '--iterations', '1.5'], '--iterations wants a whole number of at least 1, not 1.5'],
    [['a.yaml', '--seed=-1'], '--seed wants a whole number from 0 to 4294967295, not -1'],
    [['a.yaml', '--sheets', ''], '--sheets wants a folder'],
    [['a.yaml', '--sheets', 'package.json'], '--sheets wants a folder, and package.json is a file'],
  ])('%j', async (args, says) => {
    const { status, out, err } = await call(...args);
    expect({ status, out }).toEqual({ status: 2, out: '' });
    expect(err.join('\n')).toContain(`plan: ${says}\n\nusage: npm run`);
  });

  it('are none when help is asked for', async () => {
    expect(await call('--help')).toMatchObject({ status: 0, err: [], out: expect.stringMatching(/^usage: /) });
  });
});

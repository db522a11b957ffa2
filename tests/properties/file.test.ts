import { readdirSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { unprintableAt } from '../../shared/contracts/values';
import { readProductionFile } from '../../shared/file/read';
import { writeProductionFile } from '../../shared/file/write';
import { effectivePasses } from '../../shared/planner/derive';
import { anyProduction } from '../factories/any-production';

const TEMPLATES = 'templates/productions';
const templates = readdirSync(TEMPLATES).map((name) => readFileSync(`${TEMPLATES}/${name}`, 'utf8'));
const malformed = readdirSync('tests/fixtures/malformed').map((name) => readFileSync(`tests/fixtures/malformed/${name}`, 'utf8'));

describe('writing and reading', () => {
  it('gives the same production, whatever its texts and unknown fields', () => {
    fc.assert(
      fc.property(anyProduction, (file) => {
        const text = writeProductionFile(file);
        const read = readProductionFile(text);
        if (!read.ok) expect.fail(JSON.stringify(read.faults));
        expect(read.file).toEqual(file);
        expect(writeProductionFile(read.file)).toBe(text);
      }),
      { numRuns: 400 },
    );
  });

  it('gives the same production through JSON, as the database keeps it', () => {
    fc.assert(
      fc.property(anyProduction, (file) => {
        const kept = JSON.parse(JSON.stringify(file)) as typeof file;
        const read = readProductionFile(writeProductionFile(kept));
        expect(read.ok && read.file).toEqual(file);
      }),
      { numRuns: 100 },
    );
  });

  it('derives passes of every production without fail, each with an own id', () => {
    fc.assert(
      fc.property(anyProduction, (file) => {
        const passes = effectivePasses(file);
        expect(new Set(passes.map((pass) => pass.id)).size).toBe(passes.length);
        for (const pass of passes) expect(pass.room).toBeDefined();
      }),
      { numRuns: 100 },
    );
  });
});

/** A change of a text such as a slip of the hand or a broken copy makes it. */
const slip = fc.record({
  at: fc.double({ min: 0, max: 1, noNaN: true }),
  cut: fc.integer({ min: 0, max: 40 }),
  put: fc.oneof(
    fc.string({ unit: 'binary', maxLength: 6 }),
    fc.constantFrom(
      '\n',
      ' ',
      '\t',
      ':',
      ': ',
      '- ',
      '{',
      '}',
      '[',
      ']',
      ',',
      '"',
      "'",
      '#',
      '&a ',
      '*a',
      '!t ',
      '|',
      '>',
      '%',
      '? ',
      '\u0000',
      '---\n',
      '...',
      '__proto__',
      '0',
      '-1',
      'null',
      '\n  ',
    ),
  ),
});
const mutate = (text: string, slips: { at: number; cut: number; put: string }[]) =>
  slips.reduce((changed, { at, cut, put }) => {
    const place = Math.floor(at * changed.length);
    return changed.slice(0, place) + put + changed.slice(place + cut);
  }, text);

function answersPlainly(text: string): void {
  const started = performance.now();
  const read = readProductionFile(text);
  expect(performance.now() - started).toBeLessThan(10_000);
  const lines = text.split('\n').length + 1;
  const told = read.ok ? read.warnings : [...read.faults, ...read.warnings];
  if (!read.ok) expect(read.faults.length).toBeGreaterThan(0);
  for (const fault of told) {
    expect(fault.path).not.toBe('');
    expect(unprintableAt(fault.path)).toBe(-1);
    expect(fault.path).not.toContain('\n');
    expect(fault.line).toBeGreaterThan(0);
    expect(fault.line).toBeLessThanOrEqual(lines);
    expect(fault.expected).not.toBe('');
  }
  if (read.ok) {
    const again = readProductionFile(writeProductionFile(read.file));
    expect(again.ok && again.file).toEqual(read.file);
  }
}

describe('reading what is no production', () => {
  it('answers any text with faults that have a path and a line', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 400 }), (text) => answersPlainly(text)),
      { numRuns: 500 },
    );
  });

  it('answers any file after slips of the hand, and what it accepts it writes back the same', () => {
    const texts = [...templates, ...malformed];
    fc.assert(
      fc.property(fc.constantFrom(...texts), fc.array(slip, { minLength: 1, maxLength: 6 }), (text, slips) =>
        answersPlainly(mutate(text, slips)),
      ),
      { numRuns: 400 },
    );
  });

  it('answers any values at the places of a production', () => {
    const value = fc.jsonValue({ maxDepth: 3 });
    const sections = fc.record({
      redpoll: fc.constantFrom(1, 2, '1'),
      production: fc.oneof(fc.constant({ code: 'T', title: 'T', timezone: 'UTC' }), value),
      rooms: fc.oneof(fc.array(fc.record({ id: fc.constantFrom('a', 'b', 7), open: value, hears: value, loud: value })), value),
      people: value,
      songs: fc.oneof(
        fc.array(
          fc.record({
            id: fc.constantFrom('a', 'b'),
            parts: fc.array(fc.oneof(fc.record({ id: value, mode: value, after: value }), value)),
          }),
        ),
        value,
      ),
      passes: fc.oneof(fc.array(fc.record({ id: value, minutes: value, after: value, pin: value, voice: value })), value),
      events: fc.array(fc.record({ id: value, from: value, to: value })),
    });
    fc.assert(
      fc.property(sections, (drawn) => answersPlainly(JSON.stringify(drawn))),
      { numRuns: 300 },
    );
  });
});

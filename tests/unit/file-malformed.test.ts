import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Fault } from '../../shared/contracts/api';
import { readProductionFile } from '../../shared/file/read';

/**
 * Each file in the folder is wrong in its own way and ends with what must be said of it: `#! LINE PATH | WORDS`, `*` where the line or
 * the path is not the point. All of its faults are listed: a fault too many fails as much as one that is missing.
 */
const FOLDER = 'tests/fixtures/malformed';
interface Expected {
  line: string;
  path: string;
  words: string;
}

function expectedIn(text: string): Expected[] {
  return [...text.matchAll(/^#! (\S+) (.+?) \| (.+)$/gm)].map(([, line = '', path = '', words = '']) => ({ line, path, words }));
}

const fits = (fault: Fault, { line, path, words }: Expected) =>
  (line === '*' || fault.line === Number(line)) && (path === '*' || fault.path === path) && fault.expected.includes(words);

function faultsOf(text: string): Fault[] {
  const read = readProductionFile(text);
  return read.ok ? [] : read.faults;
}

const names = readdirSync(FOLDER).filter((name) => name.endsWith('.yaml'));

describe('malformed files', () => {
  it('are many', () => expect(names.length).toBeGreaterThanOrEqual(60));

  it.each(names)('%s', (name) => {
    const text = readFileSync(`${FOLDER}/${name}`, 'utf8');
    const expected = expectedIn(text);
    const faults = faultsOf(text);
    expect(expected.length).toBeGreaterThan(0);
    for (const one of expected)
      expect(
        faults.filter((fault) => fits(fault, one)),
        `${one.line} ${one.path}: ${one.words}`,
      ).toHaveLength(1);
    expect(faults.filter((fault) => !expected.some((one) => fits(fault, one)))).toEqual([]);
    for (const { line, expected: words } of faults) {
      expect(line).toBeGreaterThan(0);
      expect(words).not.toMatch(/Error|undefined|Invalid input|\bat .*\.ts|node_modules/);
    }
  });
});

const BODY = 'redpoll: 1\nproduction: { code: T, title: Test, timezone: Europe/Lisbon }\nrooms: [{ id: a, open: [] }]\n';

describe('what no editor would save', () => {
  it('a control character in the text is told with its line', () => {
    expect(faultsOf(`${BODY}people: [{ id: mara, name: Mara\u0007 }]\n`)).toEqual([
      { path: 'file', line: 4, expected: 'text without control characters' },
    ]);
  });

  it('more than 5 MB is refused at once', () => {
    expect(faultsOf(`${BODY}# ${'é'.repeat(2_700_000)}\n`)).toEqual([{ path: 'file', line: 1, expected: 'a file of at most 5 MB' }]);
  });

  it('a list of millions is refused before it is built', () => {
    const [fault, ...others] = faultsOf(`${BODY}people: [${'1,'.repeat(1_000_000)}]\n`);
    expect(others).toEqual([]);
    expect(fault).toMatchObject({ path: 'file', line: 4 });
    expect(fault?.expected).toMatch(/^a file of at most \d+ words and marks$/);
  });

  it('thousands of faults are told up to a thousand', () => {
    const faults = faultsOf(`${BODY}people:\n${'  - { id: A }\n'.repeat(1500)}`);
    expect(faults).toHaveLength(1001);
    expect(faults.at(-1)?.expected).toMatch(/^fewer faults: \d+ more/);
  });

  it.each([
    ['brackets', '['.repeat(100_000)],
    ['dashes', '- '.repeat(100_000)],
    ['question marks', '? '.repeat(100_000)],
    ['quotes', '"'.repeat(50_000)],
    ['anchors', '&a '.repeat(50_000)],
    ['stairs', Array.from({ length: 3000 }, (_, i) => `${' '.repeat(i)}a:`).join('\n')],
    ['braces as names', '{'.repeat(59)],
  ])('a heap of %s is a fault', (_, text) => {
    expect(faultsOf(text).length).toBeGreaterThan(0);
  });
});

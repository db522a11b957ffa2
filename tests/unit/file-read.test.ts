import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { ProductionFile } from '../../shared/contracts/resources';
import { readProductionFile } from '../../shared/file/read';
import { writeProductionFile } from '../../shared/file/write';
import { effectivePasses } from '../../shared/planner/derive';

const HEAD = 'redpoll: 1\nproduction: { code: T, title: Test, timezone: Europe/Lisbon }\n';
const HALL = 'rooms: [{ id: hall, open: [{ from: 2027-03-08T10:00, to: 2027-03-08T20:00 }] }]\n';

function read(text: string) {
  const result = readProductionFile(text);
  if (!result.ok) expect.fail(JSON.stringify(result.faults));
  return result;
}
const fileOf = (text: string): ProductionFile => read(text).file;

describe('reading a production file', () => {
  it('takes the least that is required, and fills nothing in', () => {
    expect(read(HEAD + HALL)).toEqual({
      ok: true,
      warnings: [],
      file: {
        production: { code: 'T', title: 'Test', timezone: 'Europe/Lisbon' },
        rooms: [{ id: 'hall', open: [{ from: '2027-03-08T10:00', to: '2027-03-08T20:00' }] }],
        people: [],
        gear: [],
        setups: [],
        changeovers: [],
        songs: [],
        events: [],
      },
    });
  });

  it('takes a byte order mark, Windows line ends, JSON, comments and a document marker alike', () => {
    const plain = fileOf(HEAD + HALL);
    expect(fileOf(`\uFEFF${HEAD}${HALL}`)).toEqual(plain);
    expect(fileOf((HEAD + HALL).replaceAll('\n', '\r\n'))).toEqual(plain);
    expect(fileOf(`%YAML 1.2\n---\n# a comment\n${HEAD}${HALL}...\n`)).toEqual(plain);
    expect(fileOf(JSON.stringify({ redpoll: 1, production: plain.production, rooms: plain.rooms }))).toEqual(plain);
  });

  it('follows anchors and aliases, also where an anchor is given anew', () => {
    const file = fileOf(`${HEAD}${HALL}people:
  - { id: una, windows: &free [{ from: 2027-03-08T10:00, to: 2027-03-08T12:00 }] }
  - { id: teo, windows: *free }
  - { id: ivo, windows: &free [{ from: 2027-03-08T15:00, to: 2027-03-08T18:00 }] }
  - { id: ada, windows: *free }
`);
    expect(file.people.map((person) => person.windows?.[0]?.from.slice(11))).toEqual(['10:00', '10:00', '15:00', '15:00']);
  });

  it('an empty list of passes stays an empty list, an absent one stays absent', () => {
    expect(fileOf(`${HEAD}${HALL}passes: []\n`).passes).toEqual([]);
    expect(fileOf(HEAD + HALL)).not.toHaveProperty('passes');
  });

  it('keeps names in every script, and emoji', () => {
    const names = ['שירה בן־ים', 'مريم النهر', '長谷川の歌', '🎺 Horns 👩‍🎤', 'Ångström–Øre', 'B♭m'];
    const file = fileOf(`${HEAD}${HALL}people:\n${names.map((name, index) => `  - { id: p${index}, name: "${name}" }`).join('\n')}\n`);
    expect(file.people.map((person) => person.name)).toEqual(names);
    expect(fileOf(writeProductionFile(file))).toEqual(file);
  });

  it('the same file read twice is the same production twice', () => {
    const text = readFileSync('templates/productions/nine-sluices.yaml', 'utf8');
    expect(fileOf(text)).toEqual(fileOf(text));
  });
});

describe('unknown fields', () => {
  const text = `${HEAD}mood: bright
rules: { step: 5, tea: 4 }
rooms:
  - { id: hall, open: [{ from: 2027-03-08T10:00, to: 2027-03-08T20:00, door: 2 }], extra: [1, { two: 3 }], constructor: x }
songs:
  - { id: s1, __proto__: { polluted: true }, parts: [{ id: lead, mode: overdub, uses: [{ gear: organ, side: left }], reverb: plate }] }
gear: [{ id: organ, "": empty, "two words": 1 }]
`;

  it('are warnings with line and path', () => {
    expect(read(text).warnings.map(({ path, line }) => `${line} ${path}`)).toEqual([
      '3 mood',
      '4 rules.tea',
      '6 rooms[0].open[0].door',
      '6 rooms[0].extra',
      '6 rooms[0].constructor',
      '8 songs[0].__proto__',
      '8 songs[0].parts[0].uses[0].side',
      '8 songs[0].parts[0].reverb',
      '9 gear[0].""',
      '9 gear[0]."two words"',
    ]);
  });

  it('are kept beside their resource and come back at their place', () => {
    const file = fileOf(text);
    expect(file.production.extra).toEqual([
      { path: ['mood'], value: 'bright' },
      { path: ['rules', 'tea'], value: 4 },
    ]);
    expect(file.songs[0]?.parts?.[0]?.extra).toEqual([
      { path: ['uses', 0, 'side'], value: 'left' },
      { path: ['reverb'], value: 'plate' },
    ]);
    const written = writeProductionFile(file);
    expect(fileOf(written)).toEqual(file);
    expect(written).toContain('uses: [ { gear: organ, side: left } ]');
  });

  it('one whose surroundings were taken away is left out, and nothing else is', () => {
    const file = fileOf(text);
    const [hall] = file.rooms;
    if (!hall) expect.fail('no room');
    const written = writeProductionFile({ ...file, rooms: [{ ...hall, open: [] }] });
    expect(written).toContain('extra: [ 1, { two: 3 } ]');
    expect(written).not.toContain('door');
    expect(readProductionFile(written).ok).toBe(true);
  });

  it('reach no prototype', () => {
    expect(fileOf(text).songs[0]).not.toHaveProperty('polluted');
    expect({}).not.toHaveProperty('polluted');
  });
});

describe('what is no fault, but hardly meant', () => {
  const warningsOf = (text: string) => read(text).warnings.map(({ path, line, expected }) => `${line} ${path}: ${expected}`);

  it('a ring of passes that wait for each other is told by name', () => {
    const passes = `passes:
  - { id: free, room: hall, minutes: 10, after: [{ pass: one }] }
  - { id: one, room: hall, minutes: 10, after: [{ pass: two }] }
  - { id: two, room: hall, minutes: 10, after: [{ pass: three, kind: approved }] }
  - { id: three, room: hall, minutes: 10, before: [{ pass: two }], after: [{ pass: one }] }
`;
    expect(warningsOf(HEAD + HALL + passes)).toEqual([
      '6 passes[1].after: passes that do not wait for each other in a ring: one → two → three → one',
    ]);
  });

  it('a ring among derived passes is told at the song', () => {
    const songs = `songs:
  - id: s1
    parts:
      - { id: a, mode: overdub, after: [{ pass: s1-b }] }
      - { id: b, mode: overdub, after: [{ pass: s1-a }] }
`;
    expect(warningsOf(HEAD + HALL + songs)).toEqual(['5 songs[0]: passes that do not wait for each other in a ring: s1-a → s1-b → s1-a']);
  });

  it('a pass in another room than its set-up, a changeover between rooms, a singer who is not there, a part without a mode', () => {
    const rest = `rooms: [{ id: a, open: [], hears: [a] }, { id: b, open: [] }]
people: [{ id: una }]
setups: [{ id: left, room: a }, { id: right, room: b }]
changeovers: [{ from: left, to: right, minutes: 5 }]
passes:
  - { id: one, room: a, setup: right, minutes: 10, voice: { una: 5 } }
`;
    expect(warningsOf(HEAD + rest)).toEqual([
      '3 rooms[0].hears: other rooms than this one',
      '6 changeovers[0]: two set-ups of one room; this changeover never happens',
      '8 passes[0].room: the room of its set-up, b',
      '8 passes[0].voice.una: a person of this pass',
    ]);
    expect(warningsOf(`${HEAD}${HALL}songs:\n  - { id: s1, parts: [{ id: lead }] }\n`)).toEqual([
      '5 songs[0].parts[0].mode: a mode such as live or overdub; without one the part is not planned',
    ]);
  });
});

describe('the starting points', () => {
  const names = readdirSync('templates/productions');
  it.each(names)('%s is read without a warning, has a summary, and survives export and import', (name) => {
    const { file, warnings } = read(readFileSync(`templates/productions/${name}`, 'utf8'));
    expect(warnings).toEqual([]);
    expect(file.production.note?.length).toBeGreaterThan(60);
    expect(effectivePasses(file).length).toBeGreaterThan(5);
    expect(fileOf(writeProductionFile(file))).toEqual(file);
  });
});

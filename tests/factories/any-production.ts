import fc from 'fast-check';
import type { ProductionFile } from '../../shared/contracts/resources';
import type { ExtraField } from '../../shared/contracts/values';
import { unprintableAt } from '../../shared/contracts/values';

/** Random productions that the reader accepts: every kind of row, references that hold, and texts that YAML could misread. */

// prettier-ignore
const AWKWARD = [
  '007', '1e3', '0x1f', '0o17', '.inf', '-.5', 'true', 'null', '~', 'yes', '- a', '# c', 'a: b', 'a #b', '2027-03-08', '2027-03-08T10:00',
  '4/4', '  before', 'after  ', '"quoted"', "'quoted'", '{x}', '[x]', '*a', '&a', '!t', '|', '>', '%a', '@a', '`a', '---', '...', '<<', '=', '?', '? a',
  ',', 'two\nlines', 'ends\n', '\n', ' \n ', 'a\n\n\nb\n', '\ttab', 'cr\r\nlf', 'cr\ralone', 'line\u2028paragraph\u2029', '\uFEFFmark', 'שלום ספינה', '\u202Eאבג',
  '🎺 horns 👩‍🎤', '長い曲名', 'B♭m', 'x'.repeat(100), '__proto__', 'constructor', '',
];

const printable = (value: string) => unprintableAt(value) < 0;
const word = fc
  .oneof(fc.constantFrom(...AWKWARD), fc.string({ unit: 'grapheme', maxLength: 30 }), fc.string({ maxLength: 30 }))
  .filter(printable);
const shortWord = word.filter((value) => value.length <= 40);
const optional = <Value>(value: fc.Arbitrary<Value>) => fc.option(value, { nil: undefined });

/** Drops fields that were drawn as absent, so that an absent field is not there at all. */
function given<Fields extends object>(fields: fc.Arbitrary<Fields>): fc.Arbitrary<Fields> {
  return fields.map((drawn) => Object.fromEntries(Object.entries(drawn).filter(([, value]) => value !== undefined)) as Fields);
}
const ids = (name: string, most: number) =>
  fc.integer({ min: 0, max: most }).map((count) => Array.from({ length: count }, (_, index) => `${name}${index}`));
const some = <Value>(values: Value[]) => fc.subarray(values);
const oneOf = (names: string[]) => (names.length > 0 ? optional(fc.constantFrom(...names)) : fc.constant(undefined));
const each = <Value>(names: string[], make: (name: string) => fc.Arbitrary<Value>) => fc.tuple(...names.map(make));

const day = fc.integer({ min: 1, max: 27 }).map((of) => `2027-05-${String(of).padStart(2, '0')}`);
const hour = (least: number, most: number) => fc.integer({ min: least, max: most }).map((of) => String(of).padStart(2, '0'));
const window = fc
  .tuple(day, hour(0, 11), hour(12, 23), fc.constantFrom('00', '15', '59'))
  .map(([date, from, to, minutes]) => ({ from: `${date}T${from}:${minutes}`, to: `${date}T${to}:${minutes}` }));
const openWindows = fc.uniqueArray(window, { maxLength: 4, selector: ({ from }) => from.slice(0, 10) });
const oneMinutes = fc.integer({ min: 1, max: 300 });
const minutes = fc.oneof(
  oneMinutes,
  fc.tuple(oneMinutes),
  fc.tuple(oneMinutes, oneMinutes, oneMinutes).map(([a, b, c]): [number, number, number] => {
    const [low = a, likely = b, high = c] = [a, b, c].sort((x, y) => x - y);
    return [low, likely, high];
  }),
);
const amount = fc.oneof(
  fc.integer({ min: 0, max: 5000 }),
  fc.double({ min: 0, max: 1e6, noNaN: true }).filter((value) => !Object.is(value, -0)),
);
const whole = (least = 0) => fc.integer({ min: least, max: 100_000 });
const importance = fc.constantFrom('must' as const, 'should' as const, 'nice' as const);

/** A value that JSON and the reader both take: no control characters, no minus zero. */
const json = fc
  .jsonValue({ maxDepth: 2 })
  .map((value): unknown => JSON.parse(JSON.stringify(value)))
  .filter((value) => !/\\(u[0-9a-f]{4}|[bf])/.test(JSON.stringify(value)) && printable(JSON.stringify(value)));
// A name that looks like a list position would come first in every JavaScript object; order is no matter of the file.
const unknownKey = fc.constantFrom('mood', 'tea time', 'true', 'extra', 'constructor', '__proto__', 'מצב');
/** Unknown fields at the given places, each name once, in the order in which the reader meets them. */
const unknown = (...places: string[][]) =>
  optional(
    fc
      .uniqueArray(fc.record({ owner: fc.nat(places.length - 1), key: unknownKey, value: json }), {
        minLength: 1,
        maxLength: 3,
        selector: ({ owner, key }) => `${owner}/${key}`,
      })
      .map((fields) =>
        fields
          .sort((a, b) => a.owner - b.owner)
          .map(({ owner, key, value }): ExtraField => ({ path: [...(places[owner] ?? []), key], value })),
      ),
  );
const extra = unknown([]);

interface Names {
  rooms: string[];
  people: string[];
  gear: string[];
  setups: string[];
  songs: string[];
  passes: string[];
  events: string[];
}

const minutesOf = (people: string[]) =>
  some(people).chain((names) =>
    each(names, () => whole()).map((drawn) => Object.fromEntries(names.map((name, at) => [name, drawn[at] ?? 0]))),
  );
const usesOf = (names: string[]) =>
  some(names).chain((gear) => each(gear, (id) => given(fc.record({ gear: fc.constant(id), count: optional(whole(1)) }))));

const production = given(
  fc.record({
    code: fc.constantFrom('SLUICE', '007', 'A B', '№ 1'),
    title: word.filter((value) => value.trim() !== ''),
    timezone: fc.constantFrom('Europe/Lisbon', 'Asia/Kathmandu', 'UTC', 'America/St_Johns'),
    currency: optional(fc.constantFrom('EUR', 'USD')),
    pitch: optional(fc.constantFrom(440, 442, 415.3)),
    recording: optional(given(fc.record({ rate: optional(fc.constant(48000)), bits: optional(fc.constant(24)) }))),
    paper: optional(fc.constantFrom('A4' as const, 'Letter' as const)),
    place: optional(given(fc.record({ name: optional(word), address: optional(word) }))),
    late: optional(word),
    note: optional(word),
    rules: optional(given(fc.record({ step: optional(whole(1)), reserve: optional(amount), oneRoomPerSong: optional(fc.boolean()) }))),
    weights: optional(given(fc.record({ waiting: optional(amount), day: optional(amount) }))),
    extra: unknown([], ['production']),
  }),
);

const roomOf = (id: string, names: Names) =>
  given(
    fc.record({
      id: fc.constant(id),
      name: optional(word),
      size: optional(fc.constant<[number, number, number]>([9, 7.5, 3.2])),
      people: optional(whole(1)),
      standing: optional(fc.boolean()),
      open: openWindows,
      loud: optional(fc.array(window, { maxLength: 2 })),
      hears: optional(some(names.rooms.filter((other) => other !== id))),
      operators: optional(some(names.people)),
      price: optional(given(fc.record({ day: optional(amount), overtimeHour: optional(amount) }))),
      note: optional(word),
      extra,
    }),
  );
const personOf = (id: string) =>
  given(
    fc.record({
      id: fc.constant(id),
      name: optional(word),
      plays: optional(fc.array(word, { maxLength: 3 })),
      crew: optional(fc.boolean()),
      windows: optional(
        fc.array(
          fc.tuple(window, fc.boolean()).map(([hours, sure]) => ({ ...hours, sure })),
          { maxLength: 3 },
        ),
      ),
      limits: optional(given(fc.record({ voice: optional(whole()), day: optional(whole()) }))),
      away: optional(whole()),
      fee: optional(given(fc.record({ waiting: optional(amount), call: optional(amount), perHour: optional(amount) }))),
      bring: optional(fc.array(word, { maxLength: 3 })),
      extra,
    }),
  );
const gearOf = (id: string) => given(fc.record({ id: fc.constant(id), name: optional(word), count: optional(whole(1)), extra }));
const setupOf = (id: string, names: Names) =>
  given(
    fc.record({
      id: fc.constant(id),
      name: optional(word),
      room: fc.constant(names.rooms[0]),
      rig: optional(whole()),
      ready: optional(minutesOf(names.people)),
      keepUntil: optional(fc.constant('approved' as const)),
      extra,
    }),
  );
const changeoverTo = (to: string) => given(fc.record({ from: fc.constant('setup0'), to: fc.constant(to), minutes: whole(), extra }));
const partOf = (id: string, names: Names) =>
  given(
    fc.record({
      id: fc.constant(id),
      players: optional(some(names.people)),
      mode: optional(fc.constantFrom('live' as const, 'guide' as const, 'overdub' as const, 'stack' as const)),
      instrument: optional(word),
      minutes: optional(minutes),
      priority: optional(importance),
      needs: optional(fc.array(word, { maxLength: 2 })),
      uses: optional(usesOf(names.gear)),
      pan: optional(fc.constantFrom(-1, -0.25, 0, 1)),
      extra,
    }),
  );
const songOf = (id: string, names: Names) =>
  given(
    fc.record({
      id: fc.constant(id),
      title: optional(word),
      length: optional(fc.constantFrom(4.2, 3)),
      key: optional(shortWord),
      click: optional(fc.boolean()),
      form: optional(word),
      rehearsal: optional(fc.integer({ min: 0, max: 4 })),
      setup: oneOf(names.setups),
      parts: optional(ids('part', 3).chain((parts) => each(parts, (part) => partOf(part, names)))),
      extra,
    }),
  );
const passOf = (id: string, names: Names) => {
  const others = names.passes.filter((other) => other !== id);
  return given(
    fc.record({
      id: fc.constant(id),
      name: optional(word),
      song: oneOf(names.songs),
      people: optional(some(names.people)),
      room: fc.constant(names.rooms[0]),
      setup: oneOf(names.setups),
      minutes,
      priority: optional(importance),
      loud: optional(fc.boolean()),
      voice: optional(minutesOf(names.people)),
      uses: optional(usesOf(names.gear)),
      after: optional(some(others).map((passes) => passes.map((pass) => ({ pass, kind: 'approved' as const, lag: 5 })))),
      before: optional(some(names.events).map((events) => events.map((event) => ({ event })))),
      together: optional(some(others)),
      pin: optional(day.map((of) => ({ day: of }))),
      extra,
    }),
  );
};
const eventOf = (id: string, names: Names) =>
  given(
    fc
      .tuple(window, fc.record({ name: optional(word), kind: optional(shortWord), people: optional(some(names.people)), extra }))
      .map(([{ from, to }, rest]) => ({ id, ...rest, from, to })),
  );

const names: fc.Arbitrary<Names> = fc.record({
  rooms: ids('room', 2).map((rooms) => ['hall', ...rooms]),
  people: ids('person', 4),
  gear: ids('gear', 2),
  setups: ids('setup', 3),
  songs: ids('song', 3),
  passes: ids('pass', 4),
  events: ids('event', 2),
});

/** A whole random production. */
export const anyProduction: fc.Arbitrary<ProductionFile> = names.chain((all) =>
  given(
    fc.record({
      production,
      rooms: each(all.rooms, (id) => roomOf(id, all)),
      people: each(all.people, personOf),
      gear: each(all.gear, gearOf),
      setups: each(all.setups, (id) => setupOf(id, all)),
      changeovers: each(all.setups.slice(1), changeoverTo),
      songs: each(all.songs, (id) => songOf(id, all)),
      passes: optional(each(all.passes, (id) => passOf(id, all))),
      events: each(all.events, (id) => eventOf(id, all)),
    }),
  ),
);

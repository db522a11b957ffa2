import { hours, wallTime } from '../contracts/values';
import type { ProductionFile } from '../contracts/resources';
import { effectivePasses } from '../planner/derive';
import { zoneClock } from '../time/wall';
import { fieldOf, type Fields, itemsOf, type Path, valuesAt } from './paths';
import type { PathFault } from './yaml';

/** Every field that holds a wall-clock time. */
const TIMES: [list: string, pattern: string][] = [
  ['rooms', 'open[].from'],
  ['rooms', 'open[].to'],
  ['rooms', 'loud[].from'],
  ['rooms', 'loud[].to'],
  ['people', 'windows[].from'],
  ['people', 'windows[].to'],
  ['gear', 'windows[].from'],
  ['gear', 'windows[].to'],
  ['passes', 'pin.at'],
  ['passes', 'pin.notBefore'],
  ['passes', 'pin.notAfter'],
  ['events', 'from'],
  ['events', 'to'],
];

/** Wall times that the clock skips when it is put forward. */
export function skippedTimes(root: Fields, zone: string): PathFault[] {
  const clock = zoneClock(zone);
  return TIMES.flatMap(([list, pattern]) =>
    valuesAt(root[list], `[].${pattern}`, [list]).flatMap(({ path, value }) => {
      const wall = wallTime.safeParse(value);
      if (!wall.success || clock.minuteOf(wall.data) !== 'gap') return [];
      return [{ path, expected: `a time that a clock in ${zone} shows; it is put forward over ${wall.data}` }];
    }),
  );
}

/** `open` windows never merge, so two of one room may touch but not overlap. */
export function overlappingHours(root: Fields): PathFault[] {
  return itemsOf(root.rooms).flatMap((room, index) => {
    const windows = itemsOf(fieldOf(room, 'open')).flatMap((window, position) => {
      const read = hours.safeParse({ from: fieldOf(window, 'from'), to: fieldOf(window, 'to') });
      return read.success ? [{ ...read.data, position }] : [];
    });
    windows.sort((a, b) => (a.from < b.from ? -1 : a.from > b.from ? 1 : a.position - b.position));
    let last = windows[0];
    return windows.slice(1).flatMap((window) => {
      const before = last;
      if (!before || window.to > before.to) last = window;
      if (!before || window.from >= before.to) return [];
      return [{ path: ['rooms', index, 'open', window.position], expected: `hours that do not overlap open[${before.position}]` }];
    });
  });
}

/** A pass takes place in its own room, or in that of its set-up. */
export function passesWithoutRoom(root: Fields): PathFault[] {
  const setups = new Map(itemsOf(root.setups).map((setup) => [fieldOf(setup, 'id'), setup]));
  return itemsOf(root.passes).flatMap((pass, index) => {
    const setup = fieldOf(pass, 'setup');
    if (fieldOf(pass, 'room') !== undefined) return [];
    if (setup !== undefined && (!setups.has(setup) || fieldOf(setups.get(setup), 'room') !== undefined)) return [];
    return [{ path: ['passes', index, 'room'], expected: 'the id of a room, or a set-up that has one' }];
  });
}

/** A changeover leads from one set-up to another, and each pair is given once. */
export function changeoverFaults(root: Fields): PathFault[] {
  const seen = new Map<string, number>();
  return itemsOf(root.changeovers).flatMap((changeover, index): PathFault[] => {
    const [from, to] = [fieldOf(changeover, 'from'), fieldOf(changeover, 'to')];
    if (typeof from !== 'string' || typeof to !== 'string') return [];
    if (from === to) return [{ path: ['changeovers', index, 'to'], expected: 'another set-up than `from`' }];
    const pair = `${from}>${to}`;
    const before = seen.get(pair);
    seen.set(pair, before ?? index);
    return before === undefined
      ? []
      : [{ path: ['changeovers', index], expected: `a pair that is given once; changeovers[${before}] has it already` }];
  });
}

/** A pin whose bounds leave no time between them. */
export function emptyPins(root: Fields): PathFault[] {
  return itemsOf(root.passes).flatMap((pass, index) => {
    const pin = fieldOf(pass, 'pin');
    const from = wallTime.safeParse(fieldOf(pin, 'notBefore'));
    const to = wallTime.safeParse(fieldOf(pin, 'notAfter'));
    if (!from.success || !to.success || from.data < to.data) return [];
    return [{ path: ['passes', index, 'pin', 'notAfter'], expected: 'a time after `notBefore`' }];
  });
}

/** What is no fault, but is hardly meant. Asked only of a file without faults. */
export function doubts(file: ProductionFile): PathFault[] {
  return [...rings(file), ...strangeRooms(file), ...singersElsewhere(file), ...partsWithoutMode(file)];
}

function strangeRooms(file: ProductionFile): PathFault[] {
  const roomOf = new Map(file.setups.map((setup) => [setup.id, setup.room]));
  const passes = (file.passes ?? []).flatMap((pass, index): PathFault[] => {
    const of = pass.setup === undefined ? undefined : roomOf.get(pass.setup);
    if (of === undefined || pass.room === undefined || of === pass.room) return [];
    return [{ path: ['passes', index, 'room'], expected: `the room of its set-up, ${of}` }];
  });
  const changeovers = file.changeovers.flatMap(({ from, to }, index): PathFault[] => {
    const [a, b] = [roomOf.get(from), roomOf.get(to)];
    return a === undefined || b === undefined || a === b
      ? []
      : [{ path: ['changeovers', index], expected: 'two set-ups of one room; this changeover never happens' }];
  });
  const rooms = file.rooms.flatMap((room, index): PathFault[] =>
    (room.hears ?? []).includes(room.id) ? [{ path: ['rooms', index, 'hears'], expected: 'other rooms than this one' }] : [],
  );
  return [...passes, ...changeovers, ...rooms];
}

function singersElsewhere(file: ProductionFile): PathFault[] {
  return (file.passes ?? []).flatMap((pass, index) =>
    Object.keys(pass.voice ?? {})
      .filter((person) => !(pass.people ?? []).includes(person))
      .map((person) => ({ path: ['passes', index, 'voice', person], expected: 'a person of this pass', key: true })),
  );
}

function partsWithoutMode(file: ProductionFile): PathFault[] {
  if (file.passes) return [];
  return file.songs.flatMap((song, songIndex) =>
    (song.parts ?? []).flatMap((part, index) =>
      part.mode === undefined
        ? [
            {
              path: ['songs', songIndex, 'parts', index, 'mode'],
              expected: 'a mode such as live or overdub; without one the part is not planned',
            },
          ]
        : [],
    ),
  );
}

/** Passes that wait for each other in a ring. Such a file can be read, and its plan is impossible. */
function rings(file: ProductionFile): PathFault[] {
  const waits = new Map<string, Set<string>>(effectivePasses(file).map((pass) => [pass.id, new Set<string>()]));
  for (const pass of effectivePasses(file)) {
    for (const one of pass.after ?? []) if ('pass' in one && waits.has(one.pass)) waits.get(pass.id)?.add(one.pass);
    for (const one of pass.before ?? []) if ('pass' in one) waits.get(one.pass)?.add(pass.id);
  }
  const found: PathFault[] = [];
  for (;;) {
    dropFree(waits);
    const start = waits.keys().next().value;
    if (start === undefined) return found;
    const ring = ringFrom(start, waits);
    const named = [...ring, ring[0]].join(' → ');
    found.push({ path: placeOf(ring[0] ?? start, file), expected: `passes that do not wait for each other in a ring: ${named}` });
    for (const id of ring) waits.delete(id);
    for (const others of waits.values()) for (const id of ring) others.delete(id);
  }
}

/** Takes away, again and again, the passes that wait for nothing. */
function dropFree(waits: Map<string, Set<string>>): void {
  const followers = new Map<string, string[]>();
  for (const [id, others] of waits) for (const other of others) followers.set(other, [...(followers.get(other) ?? []), id]);
  const free = [...waits].filter(([, others]) => others.size === 0).map(([id]) => id);
  for (let id = free.pop(); id !== undefined; id = free.pop()) {
    waits.delete(id);
    for (const follower of followers.get(id) ?? []) {
      const others = waits.get(follower);
      others?.delete(id);
      if (others?.size === 0) free.push(follower);
    }
  }
}

/** Where every pass waits for another, following what each waits for comes round. */
function ringFrom(start: string, waits: ReadonlyMap<string, ReadonlySet<string>>): string[] {
  const way: string[] = [];
  let at: string | undefined = start;
  while (at !== undefined && !way.includes(at)) {
    way.push(at);
    at = waits.get(at)?.values().next().value;
  }
  return at === undefined ? way : way.slice(way.indexOf(at));
}

function placeOf(id: string, file: ProductionFile): Path {
  const written = (file.passes ?? []).findIndex((pass) => pass.id === id);
  if (written >= 0) return ['passes', written, 'after'];
  const song = file.songs.findIndex((one) => id.startsWith(`${one.id}-`));
  return song < 0 ? [] : ['songs', song];
}

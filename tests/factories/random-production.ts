import type { Rules } from '../../shared/contracts/head';
import type { Pass, Person, ProductionFile, Room, SessionEvent, Setup } from '../../shared/contracts/resources';
import { Random } from '../../shared/solver/search/random';
import { toMinute, toWall } from '../../shared/time/wall';

/** Zones and first days: two ordinary ones, and three in whose night the clock is changed, once by half an hour. */
const PLACES = [
  ['Europe/Lisbon', '2027-03-08'],
  ['America/New_York', '2027-06-01'],
  ['Europe/Berlin', '2027-03-26'],
  ['Europe/Berlin', '2027-10-29'],
  ['Australia/Lord_Howe', '2027-04-02'],
] as const;

/** Draws of one seed, in words. */
class Draw extends Random {
  chance(percent: number): boolean {
    return this.below(100) < percent;
  }
  from<Value>(values: readonly Value[]): Value {
    return values[this.below(values.length)]!;
  }
  between(least: number, most: number): number {
    return least + this.below(most - least + 1);
  }
  some<Value>(values: readonly Value[], percent: number): Value[] {
    return values.filter(() => this.chance(percent));
  }
}

interface Scene {
  draw: Draw;
  zone: string;
  /** Midnight of each day, in elapsed minutes. */
  days: number[];
}

/** A wall time so many minutes after the midnight of a day; moved out of the hour that the spring night skips. */
function wall({ zone }: Scene, midnight: number, minutes: number): string {
  return toWall(midnight + minutes, zone);
}

/**
 * A small random production that uses every field the planner reads, the same for the same seed. Not every one can be planned.
 * @param size most passes in it
 */
export function randomProduction(seed: number, size = 9): ProductionFile {
  const draw = new Draw(seed);
  const [zone, first] = draw.chance(70) ? PLACES[draw.below(2)]! : draw.from(PLACES);
  const noon = toMinute(`${first}T12:00`, zone);
  const days = Array.from({ length: draw.between(1, 4) }, (_, i) => toMinute(`${toWall(noon + i * 1440, zone).slice(0, 10)}T00:00`, zone));
  const scene: Scene = { draw, zone, days };
  const people = Array.from({ length: draw.between(2, 5) }, (_, i) => randomPerson(scene, `p${i}`));
  const rooms = Array.from({ length: draw.between(1, 2) }, (_, i) => randomRoom(scene, 'ab'[i]!, people));
  const setups = Array.from({ length: draw.below(4) }, (_, i) => randomSetup(scene, `u${i}`, rooms, people));
  const songs = Array.from({ length: draw.between(1, 4) }, (_, i) => ({
    id: `s${i}`,
    ...(draw.chance(30) && { priority: draw.from(['must', 'should', 'nice'] as const) }),
  }));
  const gear = draw.chance(40)
    ? [{ id: 'organ', count: draw.between(1, 2), ...(draw.chance(50) && { windows: windowsOf(scene, 70) }) }]
    : [];
  const events = Array.from({ length: draw.below(3) }, (_, i) => randomEvent(scene, `e${i}`, rooms, people));
  const passes: Pass[] = [];
  for (let i = draw.between(1, size); i > 0; i--)
    passes.push(randomPass(scene, `x${passes.length}`, { people, rooms, setups, songs, gear, events, passes }));
  return {
    production: {
      code: 'RND',
      title: `Random ${seed}`,
      timezone: zone,
      rules: randomRules(draw),
      ...(draw.chance(30) && { weights: { waiting: draw.between(0, 3), day: draw.between(0, 200) } }),
    },
    rooms,
    people,
    gear,
    setups,
    changeovers: setups.flatMap(({ id }) =>
      draw.some(setups, 60).flatMap((to) => (to.id === id ? [] : [{ from: id, to: to.id, minutes: draw.between(0, 9) * 7 }])),
    ),
    songs,
    passes,
    events,
  };
}

function randomRules(draw: Draw): Rules {
  const rules: Rules = {};
  if (draw.chance(50)) rules.step = draw.from([5, 10, 15, 20]);
  if (draw.chance(20)) rules.meal = 0;
  if (draw.chance(20)) rules.mealAfter = draw.between(16, 30) * 10;
  if (draw.chance(20)) rules.breakAfter = draw.from([0, 60, 90]);
  if (draw.chance(30)) rules.wrap = draw.from([0, 20, 32]);
  if (draw.chance(30)) rules.listen = draw.from([0, 20, 33]);
  if (draw.chance(30)) rules.reserve = draw.from([0, 0.1, 0.3]);
  if (draw.chance(30)) rules.turnaround = draw.from([0, 600, 900]);
  if (draw.chance(30)) rules.changeover = draw.from([0, 15, 22]);
  if (draw.chance(20)) rules.oneRoomPerSong = false;
  return rules;
}

function randomRoom(scene: Scene, id: string, people: readonly Person[]): Room {
  const { draw, days } = scene;
  const open = days.flatMap((midnight) => {
    if (draw.chance(10)) return [];
    const from = draw.from([540, 600, 605, 840]);
    const to = draw.chance(15) ? 1560 : draw.from([1080, 1200, 1320]);
    const window = { from: wall(scene, midnight, from), to: wall(scene, midnight, to) };
    if (!draw.chance(15) || from > 600) return [window];
    return [
      { from: window.from, to: wall(scene, midnight, 840) },
      { from: wall(scene, midnight, draw.from([840, 900])), to: window.to },
    ];
  });
  return {
    id,
    open: open.length > 0 ? open : [{ from: wall(scene, days[0]!, 600), to: wall(scene, days[0]!, 1200) }],
    ...(draw.chance(25) && { standing: false }),
    ...(draw.chance(40) && { standard: draw.from([0, 300, 480]) }),
    ...(draw.chance(20) && { people: draw.between(2, 6) }),
    ...(draw.chance(25) && { loud: windowsOf(scene, 90) }),
    ...(draw.chance(40) && { hears: ['b'] }),
    ...(draw.chance(25) && { operators: [people[0]!.id] }),
  };
}

/** A window on most days. */
function windowsOf(scene: Scene, percent: number): { from: string; to: string }[] {
  const { draw, days } = scene;
  return draw.some(days, percent).map((midnight) => ({
    from: wall(scene, midnight, draw.from([540, 600, 720, 780])),
    to: wall(scene, midnight, draw.from([1020, 1140, 1260, 1380, 1500])),
  }));
}

function randomPerson(scene: Scene, id: string): Person {
  const { draw } = scene;
  const windows = windowsOf(scene, 90).map((window) => ({ ...window, ...(draw.chance(25) && { sure: false }) }));
  return {
    id,
    ...(draw.chance(40) && { windows }),
    ...(draw.chance(25) && { limits: { voice: draw.from([60, 90]), day: draw.from([420, 600]) } }),
    ...(draw.chance(30) && { away: draw.from([60, 120, 180]) }),
    ...(draw.chance(15) && { size: 2 }),
    ...(draw.chance(30) && { fee: { waiting: draw.from([0, 0.5, 2]) } }),
  };
}

function randomSetup(scene: Scene, id: string, rooms: readonly Room[], people: readonly Person[]): Setup {
  const { draw } = scene;
  const ready = Object.fromEntries(draw.some(people, 30).map((person) => [person.id, draw.between(1, 8) * 9]));
  return {
    id,
    room: draw.from(rooms).id,
    rig: draw.from([0, 30, 65, 90]),
    ...(draw.chance(60) && { ready }),
    ...(draw.chance(25) && { keepUntil: 'approved' as const }),
  };
}

function randomEvent(scene: Scene, id: string, rooms: readonly Room[], people: readonly Person[]): SessionEvent {
  const { draw, days } = scene;
  const midnight = draw.from(days);
  const from = draw.between(50, 120) * 10;
  return {
    id,
    kind: draw.from(['tuner', 'listen', 'delivery']),
    from: wall(scene, midnight, from),
    to: wall(scene, midnight, from + draw.from([15, 30, 60])),
    ...(draw.chance(60) && { room: draw.from(rooms).id }),
    ...(draw.chance(40) && { people: draw.some(people, 30).map((person) => person.id) }),
  };
}

type Lists = Pick<ProductionFile, 'people' | 'rooms' | 'setups' | 'songs' | 'gear' | 'events'> & { passes: Pass[] };

function randomPass(scene: Scene, id: string, { people, rooms, setups, songs, gear, events, passes }: Lists): Pass {
  const { draw, days } = scene;
  const room = draw.from(rooms).id;
  const fitting = setups.filter((setup) => setup.room === room);
  const cast = draw.some(people, 45).map((person) => person.id);
  const likely = draw.between(2, 16) * 6;
  const earlier = draw.some(passes, 15);
  return {
    id,
    room,
    people: cast,
    minutes: draw.chance(50) ? likely : [Math.ceil(likely / 2), likely, likely * 2],
    ...(draw.chance(70) && { song: draw.from(songs).id }),
    ...(fitting.length > 0 && draw.chance(70) && { setup: draw.from(fitting).id }),
    ...(draw.chance(40) && { priority: draw.from(['must', 'should', 'nice'] as const) }),
    ...(draw.chance(25) && { loud: true }),
    ...(draw.chance(15) && { quiet: true }),
    ...(cast.length > 0 && draw.chance(30) && { voice: { [cast[0]!]: draw.between(1, 5) * 10 } }),
    ...(gear.length > 0 && draw.chance(40) && { uses: [{ gear: 'organ' }] }),
    ...(draw.chance(50) && {
      after: [
        ...earlier.map((pass) => ({
          pass: pass.id,
          ...(draw.chance(40) && { kind: 'approved' as const }),
          ...(draw.chance(30) && { lag: draw.between(1, 9) * 7 }),
        })),
        ...draw.some(events, 15).map((event) => ({ event: event.id })),
      ],
    }),
    ...(draw.chance(10) && { before: draw.some(events, 50).map((event) => ({ event: event.id })) }),
    ...(passes.length > 0 && draw.chance(6) && { together: [draw.from(passes).id] }),
    ...(passes.length > 0 && draw.chance(10) && { apart: [draw.from(passes).id] }),
    ...(draw.chance(10) && { pin: { day: wall(scene, draw.from(days), 720).slice(0, 10) } }),
    ...(draw.chance(5) && { pin: { notBefore: wall(scene, draw.from(days), 780) } }),
    ...(draw.chance(4) && { leftOut: true }),
  };
}

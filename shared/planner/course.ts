import type { ItemKind, PlanItem } from '../contracts/plan';
import type { Minute, Minutes } from '../domain/flavours';
import { neededPasses } from '../solver/bound/needed';
import { EVER, type PassModel, type Problem, type Span } from '../solver/model';
import type { ZoneClock } from '../time/wall';

/** A plan as a course of steps, each with what must be over before it: what a simulation of its days runs through. */
export interface Course {
  /** By planned start. */
  steps: Step[];
  /** Positions of dates in the problem that have steps. */
  dates: number[];
  /** Planned arrivals, one a person and date. */
  arrivals: Minute[];
  /** Room-days with anything but events, and their last step. */
  days: { day: number; last: number }[];
  /** A minute from which the others are small numbers. */
  origin: Minute;
}

export interface Step extends Span {
  kind: ItemKind;
  /** -1 = no pass. */
  pass: number;
  must: boolean;
  /** What may be cut on a late day: passes that neither are musts nor are needed by one. */
  spare: 'should' | 'nice' | null;
  /** Low, likely and high of a pass. */
  estimate: readonly [Minutes, Minutes, Minutes];
  /** Position in `Course.dates`. */
  date: number;
  /** Whether it never begins before its planned start: events, and passes pinned to a minute. */
  fixed: boolean;
  before: { step: number; lag: Minutes; sameDate: boolean }[];
  /** Passes without which it cannot be done. */
  needs: readonly number[];
  /** Arrivals of those for whom it is the first thing on its date. */
  arrivals: number[];
  /** Who gets ready while a set-up is rigged. */
  readying: { arrival: number; minutes: Minutes }[];
  /** When it must be over; events and pauses have none. */
  deadline: Minute;
}

interface Placed extends Span {
  item: PlanItem;
  room: number;
  day: number;
  dateIndex: number;
  pass: number;
  people: number[];
}

/** @param items the items of a valid plan of the problem */
export function courseOf(problem: Problem, items: readonly PlanItem[], clock: ZoneClock): Course {
  const placed = items.map((item) => placeItem(problem, item, clock)).sort((a, b) => a.from - b.from || a.to - b.to);
  const dates = [...new Set(placed.map(({ dateIndex }) => dateIndex))].sort((a, b) => a - b);
  const arrivals: Minute[] = [];
  /** Position in `arrivals`, by person and date. */
  const arrivalOf = new Map<string, number>();
  const lastInRoom = new Map<number, number>();
  const lastOfPerson = new Map<number, number>();
  const stepOfPass = new Map<number, number>();
  const lastOfDay = new Map<number, number>();

  const arrive = (person: number, at: Placed, minute: Minute): number | null => {
    const key = `${person} ${at.dateIndex}`;
    if (arrivalOf.has(key)) return null;
    arrivalOf.set(key, arrivals.length);
    arrivals.push(minute);
    return arrivals.length - 1;
  };
  const needed = new Set(neededPasses(problem));
  const steps: Step[] = [];
  placed.forEach((at, i) => {
    const pass = at.pass < 0 ? undefined : problem.passes[at.pass];
    const before: Step['before'] = [];
    const follow = (step: number | undefined, lag = 0) => {
      if (step !== undefined) before.push({ step, lag, sameDate: placed[step]!.dateIndex === at.dateIndex });
    };
    if (at.room >= 0) follow(lastInRoom.get(at.room));
    for (const person of at.people) follow(lastOfPerson.get(person));
    for (const { pass: earlier, approved, lag } of pass?.after ?? []) {
      follow(stepOfPass.get(earlier), lag);
      if (approved) follow(listenBetween(placed, stepOfPass.get(earlier), i));
    }
    steps.push({
      kind: at.item.kind,
      from: at.from,
      to: at.to,
      pass: at.pass,
      must: pass?.priority === 'must',
      spare: pass && pass.priority !== 'must' && !needed.has(at.pass) ? pass.priority : null,
      estimate: pass?.estimate ?? [0, 0, 0],
      date: dates.indexOf(at.dateIndex),
      fixed: at.item.kind === 'event' || (pass?.at ?? null) !== null,
      before,
      needs: pass ? pass.after.map((one) => one.pass) : [],
      readying: readyingIn(problem, at, placed).flatMap(({ person, minutes }) => {
        const arrival = arrive(person, at, at.to - minutes);
        return arrival === null ? [] : [{ arrival, minutes }];
      }),
      arrivals: at.people.flatMap((person) => arrive(person, at, at.from) ?? []),
      deadline: pass ? deadlineOf(problem, pass, at) : EVER,
    });
    if (at.room >= 0) lastInRoom.set(at.room, i);
    for (const person of at.people) lastOfPerson.set(person, i);
    if (at.pass >= 0) stepOfPass.set(at.pass, i);
    if (at.day >= 0 && at.item.kind !== 'event') lastOfDay.set(at.day, i);
  });
  const days = [...lastOfDay].map(([day, last]) => ({ day, last })).sort((a, b) => a.day - b.day);
  return { steps, dates, arrivals, days, origin: placed[0]?.from ?? 0 };
}

/** Pauses, rigs, reserves and wraps bind the room only; passes, events and listens also whom they name. */
const BINDS: readonly ItemKind[] = ['pass', 'event', 'listen'];

function placeItem(problem: Problem, item: PlanItem, clock: ZoneClock): Placed {
  const minute = (wall: string) => {
    const at = clock.minuteOf(wall);
    return at === 'gap' ? 0 : at;
  };
  const from = minute(item.start);
  const to = minute(item.end);
  const room = problem.rooms.findIndex(({ id }) => id === item.room);
  const day = problem.days.findIndex((open) => open.room === room && open.from <= from && to <= open.to);
  const event = item.kind === 'event' ? problem.events.find(({ id }) => id === item.id) : undefined;
  return {
    item,
    from,
    to,
    room,
    day,
    dateIndex: event?.dateIndex ?? problem.days[day]?.dateIndex ?? 0,
    pass: item.kind === 'pass' ? problem.passes.findIndex(({ id }) => id === item.id) : -1,
    people: BINDS.includes(item.kind)
      ? item.people.map((id) => problem.people.findIndex((person) => person.id === id)).filter((i) => i >= 0)
      : [],
  };
}

/** The listen by which an earlier step was approved before a later one. */
function listenBetween(placed: readonly Placed[], earlier: number | undefined, later: number): number | undefined {
  if (earlier === undefined) return undefined;
  const from = placed[earlier]!.to;
  const to = placed[later]!.from;
  const found = placed.findIndex(({ item, ...span }) => item.kind === 'listen' && span.from >= from && span.to <= to);
  return found >= 0 && found < later ? found : undefined;
}

/** Who is called to get ready while a set-up is rigged: those who play on it, and play in the room later that day. */
function readyingIn(problem: Problem, rig: Placed, placed: readonly Placed[]): { person: number; minutes: Minutes }[] {
  if (rig.item.kind !== 'rig') return [];
  const setup = problem.setups.findIndex(({ id }) => id === rig.item.setup);
  return (problem.setups[setup]?.ready ?? []).filter(({ person }) => {
    const later = placed.filter((at) => at.pass >= 0 && at.from >= rig.to && at.people.includes(person));
    return later.some((at) => problem.passes[at.pass]!.setup === setup) && later.some((at) => at.day === rig.day);
  });
}

/** The first of: the room closes, somebody's window ends, gear goes, loud hours are over, its pin or an event wants it done. */
function deadlineOf(problem: Problem, pass: PassModel, at: Placed): Minute {
  const ends = (windows: readonly Span[] | null): Minute =>
    windows?.find((window) => window.from <= at.from && at.to <= window.to)?.to ?? EVER;
  return Math.min(
    problem.days[at.day]?.to ?? EVER,
    pass.notAfter,
    ...pass.people.map((person) => ends(problem.people[person]!.windows)),
    ...pass.uses.map(({ gear }) => ends(problem.gear[gear]!.windows)),
    pass.loud ? ends(problem.rooms[pass.room]!.loud) : EVER,
  );
}

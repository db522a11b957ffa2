import type { Minute } from '../../../domain/flavours';
import type { PassModel, Problem } from '../../model';
import { Solution } from '../../solution';

/**
 * A production that is nothing but an order: every pass goes into one room-day, no rule asks for pauses, and no calendar but the
 * passes' own bounds plays a part. Its cost is the waiting between each person's first and last pass and the changeovers, which can be
 * told from an order some hundred times faster than by making its timetable.
 */
export interface Sequence {
  problem: Problem;
  day: number;
  /** Passes of the problem, by position here. */
  passes: number[];
  minutes: Int32Array;
  /** First and latest start. */
  from: Int32Array;
  to: Int32Array;
  /** Whether those bounds can ever be felt. */
  bounded: boolean;
  /** Whether some passes must come much earlier than others. */
  urgent: boolean;
  /** Whether no meal or break can count as rest, not even one in another room, so that the best order is the best plan. */
  provable: boolean;
  /** Minutes of changeover from one pass to the next, and of the first one's rig: `change[a * count + b]`, `rig[a]`. */
  change: Int32Array;
  rig: Int32Array;
  /** Whether the order matters to the changeovers. */
  changes: boolean;
  changeWeight: number;
  /** People who can wait: pass `i` has `cast[castAt[i] … castAt[i + 1]]`. */
  people: number;
  castAt: Int32Array;
  cast: Int32Array;
  /** Price of a waited minute, and minutes of work, per person. */
  rate: Float64Array;
  work: Float64Array;
  /** `before[a * count + b]` = 1 where a must be over before b begins, also by way of others. */
  before: Uint8Array;
  ordered: boolean;
}

/** The production as an order alone, or null where more than that decides. */
export function sequenceOf(problem: Problem): Sequence | null {
  const { passes, people, rules, rooms } = problem;
  const first = passes[0];
  const day = first?.days[0];
  if (!first || day === undefined || passes.length < 2) return null;
  if (!passes.every((pass) => isPlain(pass, day)) || problem.events.length > 0) return null;
  const room = rooms[first.room]!;
  if (room.standard !== null || rules.wrap > 0 || rules.reserve > 0) return null;
  if (people.some((person) => person.windows !== null || person.day !== null || person.voice !== null || person.away !== null)) return null;
  if (problem.setups.some((setup) => setup.ready.length > 0 || setup.keepUntilApproved)) return null;

  const count = passes.length;
  const change = new Int32Array(count * count);
  const rig = new Int32Array(count);
  const { setups, changeovers } = problem;
  // A pass without a set-up leaves the one before standing, which a matrix of pairs cannot say.
  if (setups.length > 0 && passes.some((pass) => pass.setup < 0) && passes.some((pass) => pass.setup >= 0)) return null;
  passes.forEach((one, a) => {
    if (one.setup < 0) return;
    rig[a] = setups[one.setup]!.rig;
    passes.forEach((other, b) => (change[a * count + b] = changeovers[one.setup * setups.length + other.setup]!));
  });
  const longest = passes.reduce((sum, pass) => sum + pass.minutes, 0) + maximum(rig) + (count - 1) * maximum(change);
  const bounded = passes.some((pass) => pass.starts[0]!.from > first.starts[0]!.from) || tightEnds(problem, day, longest);
  const latest = passes.map((pass) => pass.starts[0]!.to);
  const pauses = (rules.meal > 0 && longest > rules.mealAfter) || (rules.breakAfter > 0 && rules.break > 0 && longest > rules.breakAfter);
  if (pauses) return null;
  return {
    problem,
    day,
    passes: passes.map((_, i) => i),
    minutes: Int32Array.from(passes, (pass) => pass.minutes),
    from: Int32Array.from(passes, (pass) => pass.starts[0]!.from),
    to: Int32Array.from(passes, (pass) => pass.starts[0]!.to),
    bounded,
    urgent: Math.max(...latest) - Math.min(...latest) > passes.reduce((sum, pass) => sum + pass.minutes, 0),
    provable: rooms.length === 1 && room.days.length === 1 ? true : rules.meal === 0 && (rules.breakAfter === 0 || rules.break === 0),
    change,
    rig,
    changes: change.some((minutes) => minutes !== change[1]) || rig.some((minutes) => minutes !== rig[0]),
    changeWeight: problem.weights.changeover,
    ...castOf(problem),
    ...orderOf(problem),
  };
}

function isPlain(pass: PassModel, day: number): boolean {
  const alone = pass.together.length === 0 && !pass.leftOut && pass.priority === 'must';
  const inOneStretch = pass.starts.length === 1 && pass.starts[0]!.day === day;
  return alone && inOneStretch && pass.uses.length === 0 && pass.after.every(({ approved, lag }) => !approved && lag === 0);
}

const maximum = (list: Int32Array) => list.reduce((most, value) => Math.max(most, value), 0);

function tightEnds(problem: Problem, day: number, longest: number): boolean {
  const opening = problem.days[day]!.from + problem.rules.step;
  return problem.passes.some((pass) => pass.starts[0]!.to < opening + longest);
}

function castOf(problem: Problem): Pick<Sequence, 'people' | 'castAt' | 'cast' | 'rate' | 'work'> {
  const waiting = problem.people.flatMap((person, q) => (person.waiting > 0 && person.passes.length > 1 ? [q] : []));
  const position = new Map(waiting.map((q, i) => [q, i]));
  const lists = problem.passes.map((pass) => pass.people.flatMap((q) => position.get(q) ?? []));
  const castAt = new Int32Array(lists.length + 1);
  lists.forEach((list, i) => (castAt[i + 1] = castAt[i]! + list.length));
  return {
    people: waiting.length,
    castAt,
    cast: Int32Array.from(lists.flat()),
    rate: Float64Array.from(waiting, (q) => problem.people[q]!.waiting),
    work: Float64Array.from(waiting, (q) => problem.people[q]!.passes.reduce((sum, pass) => sum + problem.passes[pass]!.minutes, 0)),
  };
}

function orderOf(problem: Problem): Pick<Sequence, 'before' | 'ordered'> {
  const count = problem.passes.length;
  const before = new Uint8Array(count * count);
  problem.passes.forEach((pass, b) => pass.after.forEach(({ pass: a }) => (before[a * count + b] = 1)));
  for (let via = 0; via < count; via++)
    for (let a = 0; a < count; a++)
      if (before[a * count + via] === 1) for (let b = 0; b < count; b++) if (before[via * count + b] === 1) before[a * count + b] = 1;
  return { before, ordered: before.some((value) => value === 1) };
}

/** Tells the cost of orders. A start past its latest minute is priced so high that no order with one is ever preferred. */
export class SequenceCost {
  private readonly first: Float64Array;
  private readonly last: Float64Array;
  private readonly opening: Minute;

  constructor(private readonly sequence: Sequence) {
    this.first = new Float64Array(sequence.people);
    this.last = new Float64Array(sequence.people);
    const { problem, day } = sequence;
    this.opening = problem.passes.reduce((least, pass) => Math.min(least, pass.starts[0]!.from), problem.days[day]!.to);
  }

  of(order: Int32Array): number {
    const { minutes, change, rig, changeWeight, castAt, cast, rate, work, from, to, bounded, people } = this.sequence;
    const { first, last } = this;
    const count = order.length;
    let late = 0;
    let setting = rig[order[0]!]!;
    let at = this.opening + setting;
    if (people > 0) first.fill(-1);
    for (let i = 0; i < count; i++) {
      const pass = order[i]!;
      if (i > 0) {
        const minutesOfChange = change[order[i - 1]! * count + pass]!;
        setting += minutesOfChange;
        at += minutesOfChange;
      }
      if (bounded) {
        if (at < from[pass]!) at = from[pass]!;
        if (at > to[pass]!) late += at - to[pass]!;
      }
      const end = at + minutes[pass]!;
      for (let k = castAt[pass]!; k < castAt[pass + 1]!; k++) {
        const person = cast[k]!;
        if (first[person]! < 0) first[person] = at;
        last[person] = end;
      }
      at = end;
    }
    let cost = changeWeight * setting + late * LATE;
    for (let person = 0; person < people; person++) cost += rate[person]! * (last[person]! - first[person]! - work[person]!);
    return cost;
  }
}

/** Price of a minute past the latest start. */
export const LATE = 1e5;

/** The order as a solution of the whole problem. */
export function solutionOfOrder(sequence: Sequence, order: Int32Array): Solution {
  const solution = new Solution(sequence.problem);
  solution.order.set(order);
  solution.day.fill(sequence.day);
  return solution;
}

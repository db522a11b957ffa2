import type { Minute, Minutes } from '../domain/flavours';
import { gridAtOrAfter, nameable } from './grid';
import { EVER, type Problem } from './model';

/** What the end of a room-day is made of; a gap between two pieces is a break or a meal. */
export interface TailSink {
  reserve(from: Minute, to: Minute): void;
  wrap(from: Minute, to: Minute): void;
}

/** The reserve that a room-day with so many pass minutes must hold. */
export function reserveOf(problem: Problem, passMinutes: Minutes): Minutes {
  const { reserve, step } = problem.rules;
  // A share such as 0.15 has no exact binary form; a hair more keeps whole results whole.
  return Math.floor((reserve * passMinutes + 1e-9) / step) * step;
}

/**
 * Lays reserve and wrap behind the last work of a room-day, with the pauses that its runs of work ask for and around the room's events.
 * @param to end of the last work; `mealFrom`, `breakFrom`: since when work goes on without a meal and without a break
 * @returns the end of the wrap, or `EVER` where it does not fit into the room-day
 */
export function layTail(
  problem: Problem,
  dayIndex: number,
  to: Minute,
  mealFrom: Minute,
  breakFrom: Minute,
  reserve: Minutes,
  sink: TailSink | null,
): Minute {
  const { rules, lengths, hidden } = problem;
  const day = problem.days[dayIndex]!;
  const events = problem.rooms[day.room]!.events;
  const meals = rules.meal > 0;
  const breaks = rules.breakAfter > 0 && rules.break > 0;
  const wrap = lengths.wrap;
  let left = reserve;
  let at = to;
  let wrapped = wrap === 0;
  while (left > 0 || !wrapped) {
    at = gridAtOrAfter(day.grid, rules.step, at);
    if (at >= day.to) return EVER;
    let until = day.to;
    let blocked = false;
    for (const index of events) {
      const event = problem.events[index]!;
      if (event.to <= at || event.from >= day.to) continue;
      if (event.from <= at) {
        at = event.to;
        blocked = true;
      } else until = event.from < until ? event.from : until;
      break;
    }
    if (blocked) continue;
    if (at - to >= rules.meal) mealFrom = at;
    if (at - to >= rules.break) breakFrom = at;
    const beforeMeal = meals ? rules.mealAfter - (at - mealFrom) : EVER;
    // One item may be longer than the time between breaks, where it is the first after a pause.
    const beforeBreak = breaks && breakFrom !== at ? rules.breakAfter - (at - breakFrom) : EVER;
    const needed = left > 0 ? rules.step : wrap;
    // A pause that must come before the wrap anyway comes before the reserve, where both then fit into one run of work.
    const early =
      at === to && left > 0 && beforeBreak < left + wrap && left + wrap <= rules.breakAfter && beforeMeal >= left + wrap + lengths.break;
    if (early) {
      at = to + lengths.break;
      continue;
    }
    if (beforeMeal < needed || beforeBreak < needed) {
      if (beforeMeal < needed && mealFrom === at) return EVER;
      const pause = beforeMeal < needed ? lengths.meal : lengths.break;
      if (at >= to + pause) return EVER;
      at = to + pause;
      continue;
    }
    if (until - at < needed) {
      at = until;
      if (until === day.to) return EVER;
      continue;
    }
    let length = wrap;
    if (left > 0) {
      length = Math.min(left, beforeMeal, beforeBreak, until - at);
      length -= length % rules.step;
    }
    const shown = nameable(hidden, at + length);
    if (shown > at + length) {
      at = shown - length;
      continue;
    }
    to = at + length;
    if (left > 0) {
      sink?.reserve(at, to);
      left -= length;
    } else {
      sink?.wrap(at, to);
      wrapped = true;
    }
    at = to;
  }
  return to;
}

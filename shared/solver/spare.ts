import type { Minute, Minutes } from '../domain/flavours';
import type { Problem } from './model';

/**
 * Minutes of reserve that can stand at the beginning of a gap in a room-day, so that the rest of the gap is still the pause that it was
 * and the work before goes on no longer than it may.
 * @param from end of the work before; `mealFrom`, `breakFrom`: since when that goes on without a meal and without a break
 */
export function spareIn(problem: Problem, dayIndex: number, from: Minute, to: Minute, mealFrom: Minute, breakFrom: Minute): Minutes {
  const { rules, lengths } = problem;
  const day = problem.days[dayIndex]!;
  if (day.grid.length > 1) return 0;
  let free = to;
  for (const index of problem.rooms[day.room]!.events) {
    const event = problem.events[index]!;
    if (event.from < free && from < event.to) free = event.from;
  }
  const meals = rules.meal > 0;
  const breaks = rules.breakAfter > 0 && rules.break > 0;
  const gap = to - from;
  let minutes = gap;
  if (meals && gap >= lengths.meal) minutes = gap - lengths.meal;
  else if (breaks && gap >= lengths.break) minutes = gap - lengths.break;
  else if ((meals && gap >= rules.meal) || (breaks && gap >= rules.break)) return 0;
  minutes = Math.min(minutes, free - from);
  if (meals) minutes = Math.min(minutes, rules.mealAfter - (from - mealFrom));
  if (breaks) minutes = Math.min(minutes, rules.breakAfter - (from - breakFrom));
  return minutes < rules.step ? 0 : minutes - (minutes % rules.step);
}

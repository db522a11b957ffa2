import { EVER } from '../model';
import type { Board } from '../board';
import type { StartConstraint } from './constraint';

/** The start of the person's run of work that lasts until the first item of the date, from earlier dates where nights are shorter than meals. */
function runBefore(board: Board, person: number, date: number, from: number): number {
  const { meal, turnaround } = board.problem.rules;
  if (turnaround >= meal) return from;
  const offset = board.offset[person]!;
  let i = offset + board.entryCount[person]! - 1;
  while (i >= offset && board.entryDate[i]! >= date) i -= 1;
  let run = from;
  while (i >= offset && run - board.entryEnd[i]! < meal) run = board.entryStart[i--]!;
  return run;
}

export const ownMeals: StartConstraint = {
  name: 'a meal for everybody',
  level: 'hard',
  reason: 'somebody it needs would go too long without time for a meal',
  next(board, attempt) {
    const { meal, mealAfter } = board.problem.rules;
    if (meal === 0) return attempt.start;
    let first = 0;
    let run = runBefore(board, attempt.person, attempt.date, attempt.from[0]!);
    for (let k = 0; k < attempt.count; k++) {
      if (k > 0 && attempt.from[k]! - attempt.to[k - 1]! >= meal) {
        run = attempt.from[k]!;
        first = k;
      }
      if (attempt.to[k]! - run <= mealAfter) continue;
      if (attempt.at < first) return EVER;
      if (attempt.at > first) return Math.max(attempt.to[attempt.at - 1]! + meal, attempt.start + 1);
      return k > attempt.at ? attempt.start + attempt.to[k]! - run - mealAfter : EVER;
    }
    return attempt.start;
  },
};

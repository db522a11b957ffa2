import { Decoder } from '../decode';
import { WORST, better, type Score } from '../score';
import type { Problem } from '../model';
import { Solution } from '../solution';

/** With more passes than these only the beginnings of the room-days are gone through. */
const MOST_LEADS = 150;

/**
 * A copy of a solution in which no room-day begins, and no pass is held back, later than the cost is worth.
 * @param stay the start of each pass in a plan before, if there is one
 */
export function polish(problem: Problem, solution: Solution, stay: Int32Array | null = null): Solution {
  const decoder = new Decoder(problem, stay);
  const best = new Solution(problem);
  const trial = new Solution(problem);
  const bestScore: Score = { ...WORST };
  const score: Score = { ...WORST };
  const { step } = problem.rules;

  const tried = (): boolean => {
    decoder.decode(trial, 0, score);
    if (!better(score, bestScore)) return false;
    Object.assign(bestScore, score);
    decoder.adopt(trial);
    best.copy(trial);
    return true;
  };
  /** Tries a wish at 0, then at ever smaller cuts. */
  const cut = (wishes: (of: Solution) => Int32Array, index: number): boolean => {
    let moved = false;
    for (let less = wishes(best)[index]!; less > 0; less = less >= 2 * step ? less >> 1 : 0) {
      trial.copy(best);
      const wish = wishes(trial);
      wish[index] = Math.max(0, wish[index]! - (less - (less % step) || step));
      if (tried()) moved = true;
    }
    return moved;
  };

  trial.copy(solution);
  tried();
  for (let moved = true; moved;) {
    moved = false;
    for (let day = 0; day < problem.days.length; day++) if (cut((of) => of.begin, day)) moved = true;
    if (problem.passes.length > MOST_LEADS) break;
    for (let pass = 0; pass < problem.passes.length; pass++) if (cut((of) => of.lead, pass)) moved = true;
  }
  return best;
}

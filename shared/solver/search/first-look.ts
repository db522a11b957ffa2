import { Decoder } from '../decode';
import type { Problem } from '../model';
import { WORST } from '../score';
import { Solution } from '../solution';
import { Random } from './random';
import { sequenceOf, solutionOfOrder } from './sequence/model';
import { SequenceSearch } from './sequence/anneal';
import { plainSolution, startOrder } from './start';

/** Whether a first timetable, made in no time, already places every pass: then nobody need look for a proof that there is none. */
export function placesAllAtOnce(problem: Problem): boolean {
  const decoder = new Decoder(problem);
  const solution = new Solution(problem);
  const score = { ...WORST };
  plainSolution(problem, solution, startOrder(problem, new Random(1), 0, true));
  const placesAll = (tried: Solution) => {
    decoder.decode(tried, 0, score);
    return score.missing === 0 && problem.passes.every((pass, i) => pass.leftOut || decoder.board.start[i]! >= 0);
  };
  if (placesAll(solution)) return true;
  const sequence = sequenceOf(problem);
  return sequence !== null && placesAll(solutionOfOrder(sequence, new SequenceSearch(sequence, new Random(1), () => true).best));
}

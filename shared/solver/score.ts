import type { Minute } from '../domain/flavours';
import type { Board } from './board';
import type { Tally } from './closing';
import type { Problem } from './model';

/** How good a timetable is: missing musts first, then the cost; of two equal ones the less strained is better. */
export interface Score {
  missing: number;
  total: number;
  /** What it costs people that passes are no longer where a plan before had them; no part of the total. */
  unrest: number;
  strain: number;
}

export const WORST: Score = { missing: Infinity, total: Infinity, unrest: 0, strain: Infinity };
/** Totals that differ by less are equal: sums of weights with fractions. */
const HAIR = 1e-6;

export function better(one: Score, other: Score): boolean {
  if (one.missing !== other.missing) return one.missing < other.missing;
  const more = one.total + one.unrest - other.total - other.unrest;
  return more < -HAIR || (more < HAIR && one.strain < other.strain);
}

/** Cost points that a plan must be better by for each pass that it moves, within its room-day or to another one. */
const MOVED = 10;
const MOVED_FAR = 20;

/** Minutes that a pass likes to have between its start and the latest one that people, gear, hours and pins allow, and the strain of each that lacks. */
const EASE = 90;
const STRAIN = 4;

/**
 * Writes the score of a closed timetable.
 * @param stay the start of each pass in a plan before, -1 where it had none; null where there is no such plan
 * @param valid false where a room-day could not be closed
 */
export function scoreOf(problem: Problem, board: Board, tally: Tally, stay: Int32Array | null, valid: boolean, score: Score): void {
  const { weights, passes, days } = problem;
  let missing = valid ? 0 : Infinity;
  let unplaced = 0;
  let strain = 0;
  let unrest = 0;
  for (let pass = 0; pass < passes.length; pass++) {
    const model = passes[pass]!;
    if (board.start[pass]! >= 0) {
      strain += strainOf(problem, board, pass);
      if (stay) unrest += unrestOf(problem, board, pass, stay[pass]!);
    } else if (model.priority !== 'must') unplaced += model.unplaced;
    else if (!model.leftOut) missing += 1;
  }
  for (let day = 0; day < days.length; day++) if (board.head[day]! >= 0) strain += board.last[day]! - days[day]!.from;
  score.strain = strain;
  score.unrest = unrest;
  score.missing = missing;
  score.total =
    tally.waiting +
    weights.changeover * tally.changeover +
    weights.day * tally.days +
    weights.overtime * tally.overtime +
    weights.call * tally.calls +
    weights.maybe * tally.maybe +
    unplaced;
}

/** How little a pass may run late: scarce people belong early in their window, with time for repairs behind. */
function strainOf(problem: Problem, board: Board, pass: number): number {
  const start = board.start[pass]!;
  for (const stretch of problem.passes[pass]!.starts) {
    if (stretch.day !== board.dayOf[pass] || start > stretch.to) continue;
    const slack = stretch.to - start;
    return slack < EASE && stretch.from < stretch.to ? STRAIN * (EASE - slack) : 0;
  }
  return 0;
}

function unrestOf(problem: Problem, board: Board, pass: number, before: Minute): number {
  if (before < 0 || board.start[pass] === before) return 0;
  const day = problem.days[board.dayOf[pass]!]!;
  return day.from <= before && before < day.to ? MOVED : MOVED_FAR;
}

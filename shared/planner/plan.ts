import type { Conflict, MadePlan, NoPlan, PlanItem, PlanOutcome } from '../contracts/plan';
import type { ProductionFile } from '../contracts/resources';
import { lowerBound } from '../solver/bound/bound';
import { explainImpossible } from '../solver/explain/explain';
import type { Problem } from '../solver/model';
import { placesAllAtOnce } from '../solver/search/first-look';
import { polish } from '../solver/search/polish';
import { search } from '../solver/search/search';
import type { Solution } from '../solver/solution';
import { eventsStand } from '../solver/standing-events';
import { effectivePasses } from './derive';
import { simulateOdds } from './odds';
import { toProblem } from './problem';
import { scheduleOf } from './schedule';
import { solutionOf } from './warm-start';

export interface PlanProgress {
  /** The best plan so far, whole and valid. */
  outcome: MadePlan;
  bound: number;
  seconds: number;
  iterations: number;
}

export interface PlanOptions {
  seed: number;
  /** Timetables to try; absent = until `stop` says so. The same number gives the same plan on every engine. */
  iterations?: number;
  /** Asked for every timetable. */
  stop: () => boolean;
  /** Hears of better plans, at most some times a second. */
  onProgress?: (progress: PlanProgress) => void;
  /** Milliseconds of any clock, for `seconds` and the pace of progress only. */
  now?: () => number;
  /** Items of a plan made before: where they still hold, the search begins there and moves a pass only where that is worth it. */
  start?: readonly PlanItem[];
}

/** Milliseconds between two reports of progress. */
const PACE = 250;
/** Runs of the odds of a plan that is only on the way. */
const PASSING_RUNS = 200;

/**
 * Plans a production: the best valid plan found, or why there is none.
 * @throws SkippedTimeError for a wall time that no clock shows, which the file reader refuses.
 */
export function planProduction(file: ProductionFile, options: PlanOptions): PlanOutcome {
  const now = options.now ?? (() => 0);
  const began = now();
  const seconds = () => (now() - began) / 1000;
  const problem = toProblem(file);
  const possible = eventsStand(problem) && placesAllAtOnce(problem);
  const conflicts = possible ? [] : explainImpossible({ ...file, passes: effectivePasses(file) }, options.stop);
  if (conflicts.length > 0) return noPlan('impossible', conflicts, seconds());
  if (!eventsStand(problem)) return noPlan('unsolved', [], seconds());
  let bound = lowerBound(problem);
  const from = options.start && solutionOf(problem, options.start);
  const made = (solution: Solution, runs?: number) =>
    madePlan(file, problem, polish(problem, solution, from?.starts), { bound, seed: options.seed, runs, seconds: seconds() });

  const { onProgress } = options;
  let waiting: { solution: Solution; iterations: number } | null = null;
  let told = -Infinity;
  const report = () => {
    if (!onProgress || !waiting || (options.now && now() - told < PACE)) return;
    onProgress({ outcome: made(waiting.solution, PASSING_RUNS), bound, seconds: seconds(), iterations: waiting.iterations });
    waiting = null;
    told = now();
  };
  const result = search(problem, {
    seed: options.seed,
    iterations: options.iterations,
    bound,
    from,
    stop: () => {
      report();
      return options.stop();
    },
    onBetter: (solution, score, iterations) => {
      if (score.missing === 0) waiting = { solution, iterations };
    },
  });
  if (result.score.missing > 0) return noPlan('unsolved', [], seconds());
  if (result.proven) bound = Math.max(bound, result.score.total);
  return made(result.best);
}

interface Making {
  bound: number;
  seed: number;
  runs?: number;
  seconds: number;
}

function madePlan(file: ProductionFile, problem: Problem, solution: Solution, { bound, seed, runs, seconds }: Making): MadePlan {
  const { items, calls, cost, unplaced } = scheduleOf(file, problem, solution);
  const proven = bound >= cost.total - 1e-6;
  return {
    status: proven ? 'optimal' : 'feasible',
    cost,
    bound: proven ? cost.total : bound,
    seconds,
    items,
    calls,
    unplaced,
    odds: simulateOdds(problem, items, seed, runs),
    conflicts: [],
  };
}

function noPlan(status: NoPlan['status'], conflicts: Conflict[], seconds: number): NoPlan {
  return { status, cost: null, bound: null, seconds, items: [], calls: [], unplaced: [], odds: null, conflicts };
}

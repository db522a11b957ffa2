import type { Conflict, MadePlan, PlanItem, PlanOutcome } from '../contracts/plan';
import type { ProductionFile } from '../contracts/resources';
import type { Problem } from '../solver/model';
import { search } from '../solver/search/search';
import type { Solution } from '../solver/solution';
import { eventsStand } from '../solver/standing-events';
import { toProblem } from './problem';
import { scheduleOf } from './schedule';

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
  stop: () => boolean;
  onProgress?: (progress: PlanProgress) => void;
  /** Milliseconds of any clock, for `seconds` and the pace of progress only. */
  now?: () => number;
  /** Items of a plan made before: where they still hold, the search begins there. */
  start?: PlanItem[];
}

/**
 * Plans a production: the best valid plan found, or why there is none. Never throws for a file that the reader accepts.
 */
export function planProduction(file: ProductionFile, options: PlanOptions): PlanOutcome {
  const now = options.now ?? (() => 0);
  const began = now();
  const seconds = () => (now() - began) / 1000;
  const problem = toProblem(file);
  const bound = 0;
  if (!eventsStand(problem)) return noPlan('unsolved', [], seconds());
  const result = search(problem, { seed: options.seed, iterations: options.iterations, stop: options.stop, bound });
  if (result.score.missing > 0) return noPlan('unsolved', [], seconds());
  return madePlan(file, problem, result.best, bound, seconds());
}

function madePlan(file: ProductionFile, problem: Problem, solution: Solution, bound: number, seconds: number): MadePlan {
  const { items, calls, cost, unplaced } = scheduleOf(file, problem, solution);
  const status = bound >= cost.total ? 'optimal' : 'feasible';
  return { status, cost, bound: Math.min(bound, cost.total), seconds, items, calls, unplaced, odds: { musts: 0, days: [] }, conflicts: [] };
}

function noPlan(status: 'impossible' | 'unsolved', conflicts: Conflict[], seconds: number): PlanOutcome {
  return { status, cost: null, bound: null, seconds, items: [], calls: [], unplaced: [], odds: null, conflicts };
}

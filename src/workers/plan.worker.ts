import { expose } from 'comlink';
import type { MadePlan, PlanItem, PlanOutcome } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { planProduction } from '../../shared/planner/plan';

/** What is asked of the planner. `start` is a plan to begin from, so that what need not move stays. */
export interface PlanningOrder {
  seed: number;
  seconds: number;
  start?: PlanItem[];
}
/** The best plan so far. */
export interface PlanningProgress {
  outcome: MadePlan;
  bound: number;
  seconds: number;
  iterations: number;
}

const MS = 1000;

const api = {
  plan(file: ProductionFile, { seed, seconds, start }: PlanningOrder, onProgress: (progress: PlanningProgress) => void): PlanOutcome {
    const begun = performance.now();
    return planProduction(file, {
      seed,
      stop: () => performance.now() - begun >= seconds * MS,
      now: () => performance.now(),
      onProgress,
      ...(start ? { start } : {}),
    });
  },
};
export type PlanApi = typeof api;
expose(api);

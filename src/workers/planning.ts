import { proxy, wrap } from 'comlink';
import type { PlanOutcome } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import type { PlanApi, PlanningOrder, PlanningProgress } from './plan.worker';

export interface PlanningRun {
  /** The answer; never settles after `end`. */
  finished: Promise<PlanOutcome>;
  /** Stops at once; what progress brought so far is all there will be. */
  end: () => void;
}

/** Plans in a worker of its own, so that the page stays awake; the worker goes when the answer is there. */
export function startPlanning(file: ProductionFile, order: PlanningOrder, onProgress: (progress: PlanningProgress) => void): PlanningRun {
  const worker = new Worker(new URL('./plan.worker.ts', import.meta.url), { type: 'module' });
  const remote = wrap<PlanApi>(worker);
  const broken = new Promise<never>((_resolve, reject) => {
    worker.addEventListener('error', (event) => reject(new Error(event.message || 'the planner could not be started')));
  });
  const finished = Promise.race([remote.plan(file, order, proxy(onProgress)), broken]).finally(() => worker.terminate());
  return { finished, end: () => worker.terminate() };
}

import { checkPlan } from '../../shared/solver/check/check';
import { planProduction } from '../../shared/planner/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { seconds, type Measure } from './table';

const BUDGET = 10_000;

/** Plans for ten seconds, and looks when the first valid plan was there. */
export function planningTimes(file: ProductionFile): Measure[] {
  const began = performance.now();
  let first: number | null = null;
  const outcome = planProduction(file, {
    seed: 1,
    now: () => performance.now(),
    stop: () => performance.now() - began >= BUDGET,
    onProgress: () => (first ??= performance.now() - began),
  });
  if (outcome.cost === null || first === null) throw new Error(`no plan: ${outcome.status}`);
  const { violations } = checkPlan(file, outcome);
  if (violations.length) throw new Error(`the plan is not valid: ${violations[0]?.says}`);
  return [
    { what: 'first valid plan of the demo', result: seconds(first), goal: '≤ 1 s' },
    {
      what: 'cost of the demo after 10 s (bound)',
      result: `${outcome.cost.total.toFixed(0)} (≥ ${outcome.bound.toFixed(0)})`,
      goal: '',
    },
  ];
}

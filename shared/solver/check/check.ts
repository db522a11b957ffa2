import type { PlanCost } from '../../contracts/plan';
import type { ProductionFile } from '../../contracts/resources';
import { checkCalls } from './calls';
import { costOf, checkStatedCost } from './cost';
import { checkEvents } from './events';
import { checkItems } from './items';
import { checkOrder } from './order';
import { checkPasses } from './passes';
import { checkPeople } from './people';
import { personDays } from './presence';
import { readForCheck, type Say, type StatedPlan, type Violation } from './reading';
import { checkResources } from './resources';
import { checkRoomDays } from './room-days';
import { checkSetups } from './setups';

export type { Rule, StatedPlan, Violation } from './reading';

/**
 * Checks a plan against its production file and lists every violation, in words; recomputes the cost. It shares no code with the search,
 * its constraints, its score or the planner, so that a mistake there does not excuse itself here.
 * @param file a production whose `passes` are written out: give `{ ...file, passes: effectivePasses(file) }` where they are derived. A
 *   pass with `leftOut: true` was left out by hand: it may not be placed, and a must among them is not missed.
 * @param plan items, calls and the unplaced passes, and where wanted the cost, bound and status that it states
 */
export function checkPlan(file: ProductionFile, plan: StatedPlan): { violations: Violation[]; cost: PlanCost } {
  const violations: Violation[] = [];
  const say: Say = (rule, says) => violations.push({ rule, says });
  const reading = readForCheck(file, plan, say);
  checkItems(reading, say);
  checkEvents(reading, plan, say);
  checkPasses(reading, plan, say);
  checkResources(reading, say);
  checkSetups(reading, say);
  checkOrder(reading, say);
  checkRoomDays(reading, say);
  const days = personDays(reading);
  checkPeople(reading, days, say);
  checkCalls(reading, days, plan, say);
  const cost = costOf(reading, days);
  checkStatedCost(cost, plan, say);
  return { violations, cost };
}

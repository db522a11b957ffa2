import type { PlanCost } from '../../contracts/plan';
import type { PersonDay } from './presence';
import { itemsOf, priorityOf, type Reading, type Say, type StatedPlan } from './reading';
import { lengthOf, minutesWithin } from './spans';

/** The cost of a plan in points, recomputed from its items and the file alone. */
export function costOf(reading: Reading, days: readonly PersonDay[]): PlanCost {
  const { weights } = reading;
  let waiting = 0;
  let maybe = 0;
  for (const { person, stays } of days) {
    const reader = reading.people.get(person.id);
    for (const stay of stays) {
      waiting += stay.waiting * (person.fee?.waiting ?? 1);
      if (reader?.windows && reader.sure) maybe += minutesWithin(reader.windows, stay) - minutesWithin(reader.sure, stay);
    }
  }
  let changeover = 0;
  for (const item of reading.items) if (item.kind === 'rig' || item.kind === 'changeover') changeover += lengthOf(item);
  let used = 0;
  let overtime = 0;
  for (const { room, days: roomDays } of reading.rooms.values()) {
    for (const day of roomDays) {
      const items = itemsOf(reading, day);
      if (items.length === 0) continue;
      used += 1;
      const span = Math.max(...items.map((item) => item.to)) - items[0]!.from;
      // A standard of 0 means that the room has none.
      if (room.standard !== undefined && room.standard > 0) overtime += Math.max(0, span - room.standard);
    }
  }
  let unplaced = 0;
  for (const pass of reading.passes.values()) {
    const priority = priorityOf(reading, pass);
    if (!reading.placed.has(pass.id) && priority !== 'must') unplaced += weights[priority];
  }
  const parts = {
    waiting: weights.waiting * waiting,
    changeover: weights.changeover * changeover,
    day: weights.day * used,
    overtime: weights.overtime * overtime,
    call: weights.call * days.length,
    maybe: weights.maybe * maybe,
    unplaced,
  };
  return { total: Object.values(parts).reduce((sum, part) => sum + part, 0), ...parts };
}

/** Weights may be fractions, so sums made in another order differ by a rounding. */
const close = (one: number, other: number) => Math.abs(one - other) <= 1e-6 * Math.max(1, Math.abs(one), Math.abs(other));

/** Cost, bound and status that a plan states for itself agree with the cost found here. */
export function checkStatedCost(cost: PlanCost, plan: StatedPlan, say: Say): void {
  if (plan.cost)
    for (const part of ['total', 'waiting', 'changeover', 'day', 'overtime', 'call', 'maybe', 'unplaced'] as const)
      if (!close(plan.cost[part], cost[part]))
        say('cost', `The plan states ${plan.cost[part]} points for ${part}; they are ${cost[part]}.`);
  if (plan.bound === undefined) return;
  if (plan.bound > cost.total && !close(plan.bound, cost.total)) say('cost', `The bound ${plan.bound} is above the cost ${cost.total}.`);
  if (plan.status === 'optimal' && !close(plan.bound, cost.total))
    say('cost', `The plan is called optimal, but its bound ${plan.bound} is not its cost ${cost.total}.`);
}

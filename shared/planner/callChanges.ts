import type { CallChange } from '../contracts/api';
import type { PlanCall } from '../contracts/plan';

const keyOf = ({ date, person }: PlanCall): string => `${date} ${person}`;

/** Whether two calls ask the same of a person; how long they work or wait in between is no news to them. */
const sameTimes = (a: PlanCall, b: PlanCall): boolean => a.arrive === b.arrive && a.ready === b.ready && a.release === b.release;

/**
 * How the calls of a plan differ from those published before (`null`: nothing was), one entry per person and date of either, ordered
 * by date and person.
 */
export function callChanges(before: readonly PlanCall[] | null, after: readonly PlanCall[]): CallChange[] {
  const old = new Map((before ?? []).map((call) => [keyOf(call), call]));
  const fresh = new Map(after.map((call) => [keyOf(call), call]));
  return [...new Set([...old.keys(), ...fresh.keys()])].sort().map((key): CallChange => {
    const was = old.get(key) ?? null;
    const is = fresh.get(key) ?? null;
    const { person, date } = (is ?? was)!;
    const kind = was === null ? 'new' : is === null ? 'cancelled' : sameTimes(was, is) ? 'same' : 'moved';
    return { person, date, kind, before: was, after: is };
  });
}

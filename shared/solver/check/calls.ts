import type { PlanCall } from '../../contracts/plan';
import type { PersonDay } from './presence';
import type { Reading, Say, StatedPlan } from './reading';

const keyOf = (person: string, date: string) => `${person} on ${date}`;

/** One call for each person and date with something to do, an event alone included, and each of them exactly right. */
export function checkCalls(reading: Reading, days: readonly PersonDay[], plan: StatedPlan, say: Say): void {
  const due = new Map(days.map((day) => [keyOf(day.person.id, day.date), day]));
  const made = new Set<string>();
  for (const call of plan.calls) {
    const key = keyOf(call.person, call.date);
    const day = due.get(key);
    if (!reading.people.has(call.person)) say('calls', `${call.person} is called, but the file has no such person.`);
    else if (!day) say('calls', `${key} is called and has nothing to do.`);
    else if (made.has(key)) say('calls', `${key} is called twice.`);
    else checkCall(reading, day, call, say);
    made.add(key);
  }
  for (const key of due.keys()) if (!made.has(key)) say('calls', `${key} has no call.`);
}

function checkCall(reading: Reading, day: PersonDay, call: PlanCall, say: Say): void {
  const key = keyOf(call.person, call.date);
  const compare = (what: string, stated: string | number, right: string | number) => {
    if (stated !== right) say('calls', `The call of ${key} says ${what} ${stated} instead of ${right}.`);
  };
  compare('arrive', call.arrive, reading.clock.wallOf(day.arrive));
  compare('ready', call.ready, reading.clock.wallOf(day.ready));
  compare('release', call.release, reading.clock.wallOf(day.release));
  compare(
    'working',
    call.working,
    day.stays.reduce((sum, stay) => sum + stay.work, 0),
  );
  compare(
    'waiting',
    call.waiting,
    day.stays.reduce((sum, stay) => sum + stay.waiting, 0),
  );
}

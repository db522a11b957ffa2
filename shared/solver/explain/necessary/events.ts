import type { NecessaryCondition } from '../condition';
import { holds } from '../../model';
import type { EventFacts, Statement } from '../statement';
import { eventsThatHold, ruleOf, type View } from '../view';
import { eventWords, personWords, roomWords } from '../words';

const overlap = (one: EventFacts, other: EventFacts) => one.from < other.to && other.from < one.to;

/** Two events never share a room or a person at one time. */
export const eventsApart: NecessaryCondition = {
  name: 'events apart',
  subjects({ statement }) {
    const events = [...statement.events.values()];
    return events.flatMap((one, i) =>
      events.slice(i + 1).flatMap((other) => (shared(statement, one, other) ? [`${one.event.id} ${other.event.id}`] : [])),
    );
  },
  fails(view, subject) {
    const [one, other] = eventsThatHold(
      view,
      subject.split(' ').map((id) => view.statement.events.get(id)!),
    );
    const what = one && other ? shared(view.statement, one, other) : null;
    return what && `${eventWords(view.statement, one!.event.id)} and ${eventWords(view.statement, other!.event.id)} both take ${what}`;
  },
};

function shared(statement: Statement, one: EventFacts, other: EventFacts): string | null {
  if (!overlap(one, other)) return null;
  if (one.event.room !== undefined && one.event.room === other.event.room) return roomWords(statement, one.event.room);
  const person = (one.event.people ?? []).find((id) => other.event.people?.includes(id) === true);
  return person === undefined ? null : personWords(statement, person);
}

/**
 * The events that name a person leave them, with nothing else to do, inside their windows and limits, fed and rested. More work only makes
 * days longer, so it mends none of that.
 */
export const eventsOfAPerson: NecessaryCondition = {
  name: 'events of a person',
  subjects: ({ statement }) => [...statement.people.values()].filter(({ events }) => events.length > 0).map(({ person }) => person.id),
  fails(view, subject) {
    const { person, events } = view.statement.people.get(subject)!;
    const name = personWords(view.statement, subject);
    const days = new Map<string, EventFacts[]>();
    for (const event of eventsThatHold(view, events).sort((one, other) => one.from - other.from))
      days.set(event.date, [...(days.get(event.date) ?? []), event]);
    let release = -Infinity;
    for (const [, list] of [...days].sort(([one], [other]) => (one < other ? -1 : 1))) {
      const arrive = list[0]!.from;
      if (release > -Infinity && arrive - release < ruleOf(view, 'turnaround')) return `${name} has too short a night between two events`;
      release = list.reduce((latest, event) => Math.max(latest, event.to), arrive);
      const problem = strain(view, person.id, list, release - arrive);
      if (problem !== null) return `${name} ${problem}`;
    }
    return null;
  },
};

function strain(view: View, id: string, list: readonly EventFacts[], length: number): string | null {
  const { person, windows } = view.statement.people.get(id)!;
  const limit = person.limits?.day;
  if (limit !== undefined && length > limit && view.has(`people.${id}.limits`)) return 'is held by events for longer than a day may be';
  const { meal, mealAfter } = { meal: ruleOf(view, 'meal'), mealAfter: ruleOf(view, 'mealAfter') };
  const stays: { from: number; to: number }[] = [];
  let run = { from: list[0]!.from, to: list[0]!.from };
  for (const { from, to } of list) {
    const stay = stays.at(-1);
    if (!stay || (person.away !== undefined && from - stay.to >= person.away)) stays.push({ from, to });
    else stay.to = Math.max(stay.to, to);
    run = from - run.to >= meal && from > run.to ? { from, to } : { from: run.from, to: Math.max(run.to, to) };
    if (meal > 0 && run.to - run.from > mealAfter) return 'has events without time for a meal';
  }
  const outside = windows !== null && stays.some((stay) => !holds(windows, stay.from, stay.to));
  return outside && view.has(`people.${id}.windows`) ? 'is wanted by an event when they are not free' : null;
}

import type { Reading, Say, StatedPlan } from './reading';

/** The plan lists every event of the file once and as it stands there: its times, its room and its people. */
export function checkEvents(reading: Reading, plan: StatedPlan, say: Say): void {
  const listed = new Set<string>();
  for (const item of plan.items) {
    if (item.kind !== 'event') continue;
    const event = reading.file.events.find(({ id }) => id === item.id);
    if (!event) {
      say('events', `The plan lists an event ${item.id ?? 'without an id'} that the file does not have.`);
      continue;
    }
    if (listed.has(event.id)) say('events', `The plan lists the event ${event.id} twice.`);
    listed.add(event.id);
    if (item.start !== event.from || item.end !== event.to)
      say('events', `The event ${event.id} is from ${event.from} to ${event.to}; the plan says ${item.start} to ${item.end}.`);
    if (item.room !== event.room)
      say('events', `The event ${event.id} is in ${event.room ?? 'no room'}; the plan says ${item.room ?? 'no room'}.`);
    const people = [...(event.people ?? [])].sort().join(', ');
    if ([...item.people].sort().join(', ') !== people)
      say('events', `The event ${event.id} wants ${people || 'nobody'}; the plan says ${item.people.join(', ') || 'nobody'}.`);
  }
  for (const { id } of reading.file.events) if (!listed.has(id)) say('events', `The plan does not list the event ${id}.`);
}

import type { Minutes } from '../../domain/flavours';
import { nameOf, type Item, type Reading, type Say } from './reading';
import type { Own, PersonDay } from './presence';
import { covers, longRuns, overlap } from './spans';

/** A person is in one thing at a time, inside their windows, fed, rested and within their limits. */
export function checkPeople(reading: Reading, days: readonly PersonDay[], say: Say): void {
  const occupied = [...reading.items.filter((item) => item.kind !== 'rig' && item.kind !== 'changeover'), ...reading.events.values()];
  for (const { person, windows } of reading.people.values()) {
    const mine = days.filter((day) => day.person === person);
    const own = mine.flatMap((day) => day.own).sort((one, other) => one.from - other.from || one.to - other.to);
    checkOnePlace(person.id, [...occupied.filter((item) => item.people.includes(person.id)), ...own.filter((item) => item.readying)], say);
    const { meal, mealAfter, turnaround } = reading.rules;
    if (meal > 0)
      for (const run of longRuns(own, { most: mealAfter, pause: meal, excuseOne: false }))
        say(
          'meals',
          `${person.id} has no time for a meal in more than ${mealAfter} min by the end of ${called(run.last)} at ${run.last.start}.`,
        );
    mine.forEach((day, position) => {
      const before = mine[position - 1];
      const rest = before ? day.arrive - before.release : Infinity;
      if (before && rest < turnaround)
        say('turnaround', `${person.id} has ${rest} min between ${before.date} and ${day.date}, less than ${turnaround}.`);
      for (const stay of day.stays)
        if (windows && !covers(windows, stay)) {
          const from = reading.clock.wallOf(stay.from);
          say('windows', `${person.id} is wanted from ${from} to ${reading.clock.wallOf(stay.to)}, not inside one of their windows.`);
        }
      checkLimits(reading, day, say);
    });
  }
}

const called = (own: Own): string => (own.readying ? 'getting ready' : nameOf(own));

/** A reserve, wrap, meal or break binds whom it names; getting ready binds too. People of a rig or changeover are not bound. */
function checkOnePlace(person: string, items: readonly (Item & { readying?: boolean })[], say: Say): void {
  const sorted = [...items].sort((one, other) => one.from - other.from || one.to - other.to);
  sorted.forEach((item, position) => {
    for (const later of sorted.slice(position + 1)) {
      if (later.from >= item.to) break;
      if (!overlap(item, later)) continue;
      const name = (which: Item & { readying?: boolean }) => (which.readying ? `getting ready in ${which.room}` : nameOf(which));
      say('people', `${person} is in two things at ${later.start}: ${name(item)} and ${name(later)}.`);
    }
  });
}

function checkLimits(reading: Reading, day: PersonDay, say: Say): void {
  const { limits, id } = day.person;
  const length: Minutes = day.release - day.arrive;
  if (limits?.day !== undefined && length > limits.day)
    say('limits', `${id} is called for ${length} min on ${day.date}, longer than their ${limits.day}.`);
  const passes = day.own.flatMap((item) => (item.kind === 'pass' && item.id !== undefined ? [reading.passes.get(item.id)] : []));
  const voice = passes.reduce((sum, pass) => sum + (pass?.voice?.[id] ?? 0), 0);
  if (limits?.voice !== undefined && voice > limits.voice)
    say('limits', `${id} sings ${voice} min on ${day.date}, more than their ${limits.voice}.`);
}

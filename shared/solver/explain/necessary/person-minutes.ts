import type { Pass } from '../../../contracts/resources';
import type { Minutes, PersonId, WallDate } from '../../../domain/flavours';
import { merged, type Span } from '../../model';
import type { NecessaryCondition } from '../condition';
import { leastEntry, pauseRules } from '../days';
import { leastBins } from '../../packing';
import { mostOfDay } from '../../pauses';
import { placesOf, type Place } from '../places';
import { common, total, without } from '../../spans';
import { castOf, eventsThatHold, fieldOf, minutesOf, neededPasses, roomIdOf, type View } from '../view';
import { personWords } from '../words';
import { dayWords, length } from '../../../time/words';

/**
 * What a person must do on some dates fits into their windows, their longest day with its meals, and their voice. Asked of every run of
 * dates that begins with the first date of some pass and ends with the last of one, short runs first.
 */
export const personMinutes: NecessaryCondition = {
  name: 'person minutes',
  subjects(view) {
    const stretches = [...view.statement.people.keys()].map((person) => {
      const passes = neededPasses(view).filter((pass) => castOf(view.statement, pass).has(person));
      const dates = passes.map((pass) =>
        placesOf(view, pass)
          .map(({ date }) => date ?? '')
          .sort(),
      );
      const firsts = [...new Set(dates.flatMap((list) => list.slice(0, 1)))];
      const lasts = [...new Set(dates.flatMap((list) => list.slice(-1)))];
      return firsts.flatMap((first) => lasts.filter((last) => first <= last).map((last) => ({ person, first, last })));
    });
    const days = ({ first, last }: { first: string; last: string }) => Date.parse(last) - Date.parse(first);
    return stretches
      .flat()
      .sort((one, other) => days(one) - days(other))
      .map(({ person, first, last }) => `${person} ${first} ${last}`);
  },
  fails(view, subject) {
    const [person = '', first = '', last = ''] = subject.split(' ');
    const within = ({ date }: Place) => date !== null && first <= date && date <= last;
    const passes = neededPasses(view).filter((pass) => {
      if (!castOf(view.statement, pass).has(person)) return false;
      const places = placesOf(view, pass);
      return places.length > 0 && places.every(within);
    });
    if (passes.length < 2) return null;
    const dates = new Set(passes.flatMap((pass) => placesOf(view, pass).map(({ date }) => date!)));
    const when = first === last ? `on ${dayWords(first)}` : `from ${dayWords(first)} to ${dayWords(last)}`;
    const sizes = passes.map((pass) => minutesOf(view, pass));
    const wanted = sizes.reduce((sum, size) => sum + size, 0);
    const capacities = [...dates].map((date) => mostOnDate(view, person, passes, date));
    const most = capacities.reduce((sum, capacity) => sum + capacity, 0);
    const name = personWords(view.statement, person);
    if (wanted > most) return `${name} would have ${length(wanted)} of passes ${when} and time for ${length(most)} at most`;
    if (leastBins(sizes, capacities) === Infinity) return `The passes of ${name} are too long to be shared out ${when}`;
    if (changesFail(view, person, passes, dates)) return `${name} has too little time ${when} for the changeovers between their passes`;
    return voiceFails(view, person, passes, dates.size) ? `${name} would sing more ${when} than they may` : null;
  },
};

/** The most minutes of these passes that a person can have on one date. */
function mostOnDate(view: View, person: PersonId, passes: readonly Pass[], date: WallDate): Minutes {
  const { statement } = view;
  const facts = statement.people.get(person)!;
  const rooms = new Set(passes.map((pass) => roomIdOf(statement, pass)!));
  const longest = Math.max(...passes.map((pass) => minutesOf(view, pass)));
  const open = merged(
    [...rooms].flatMap((room): Span[] => {
      if (view.has(`rooms.${room}.open`)) return statement.rooms.get(room)!.windows.filter((window) => window.date === date);
      // What starts late on a day of a room without hours may go on into the next one.
      return statement.calendar.filter((day) => day.date === date).map(({ from, to }) => ({ from, to: to + longest }));
    }),
  );
  const free = without(open, merged(eventsThatHold(view, facts.events)));
  const limit = facts.person.limits?.day;
  const day = limit !== undefined && view.has(`people.${person}.limits`) ? limit : Infinity;
  const windows = facts.windows && view.has(`people.${person}.windows`) ? facts.windows : null;
  const most = (spans: readonly Span[]) => {
    if (spans.length === 0) return 0;
    return Math.min(total(spans), mostOfDay(pauseRules(view), Math.min(day, spans.at(-1)!.to - spans[0]!.from)));
  };
  if (!windows) return most(free);
  // Without time off between, a day is one stay, and a stay lies in one window.
  if (facts.person.away === undefined) return Math.max(0, ...windows.map((window) => most(common(free, [window]))));
  return most(common(free, windows));
}

/**
 * Whether passes in one room and the changeovers between them are more than a person's windows hold. On each date one set-up may stand
 * already; without time off between, the changeovers to the others lie in the person's stay.
 */
function changesFail(view: View, person: PersonId, passes: readonly Pass[], dates: ReadonlySet<WallDate>): boolean {
  const { statement } = view;
  const { person: model, windows } = statement.people.get(person)!;
  const room = roomIdOf(statement, passes[0]!)!;
  if (!windows || model.away !== undefined || passes.some((pass) => roomIdOf(statement, pass) !== room)) return false;
  if (new Set(passes.map(({ setup }) => setup)).size <= dates.size || !view.has(`people.${person}.windows`)) return false;
  const setups = new Set(passes.flatMap((pass) => fieldOf(view, pass, 'setup') ?? []));
  const entries = [...setups].map((setup) => leastEntry(view, setup)).sort((one, other) => one - other);
  const changes = entries.slice(0, Math.max(0, entries.length - dates.size)).reduce((sum, entry) => sum + entry, 0);
  const open = statement.rooms.get(room)!.windows;
  const free = [...dates].map((date) => {
    const hours = view.has(`rooms.${room}.open`) ? open.filter((window) => window.date === date) : null;
    return Math.max(0, ...windows.map((window) => total(hours ? common(merged(hours), [window]) : [window])));
  });
  return passes.reduce((sum, pass) => sum + minutesOf(view, pass), changes) > free.reduce((sum, minutes) => sum + minutes, 0);
}

/** Whether the voice minutes, none of a pass split, are more than all dates allow together. */
function voiceFails(view: View, person: PersonId, passes: readonly Pass[], dates: number): boolean {
  const limit = view.statement.people.get(person)!.person.limits?.voice;
  if (limit === undefined || !view.has(`people.${person}.limits`)) return false;
  const voices = passes.map((pass) => (pass.voice?.[person] ? (fieldOf(view, pass, 'voice')?.[person] ?? 0) : 0));
  return leastBins(voices, new Array<number>(dates).fill(limit)) === Infinity;
}

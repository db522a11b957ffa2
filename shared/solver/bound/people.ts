import type { Minutes } from '../../domain/flavours';
import { merged, within, type PassModel, type PersonModel, type Problem, type Span } from '../model';
import { leastBins } from '../packing';
import { mostOfDay } from '../pauses';
import { common, total } from '../spans';
import { leastPlaces } from './stab';

/**
 * The least number of dates on which a person is called. Dates of events that name them are certain; beyond those, at least as many as
 * passes without a common date, as their minutes fill at the most a date allows, and as their voice takes.
 */
export function leastCalls(problem: Problem, person: number, passes: readonly PassModel[]): number {
  const model = problem.people[person]!;
  const certain = new Set(model.events.map((event) => problem.events[event]!.dateIndex));
  const datesOf = (pass: PassModel) => [...new Set(pass.days.map((day) => problem.days[day]!.dateIndex))];
  const apart = leastPlaces(passes.map(datesOf), certain);
  const dates = [...new Set(passes.flatMap(datesOf))];
  /** Dates beyond the certain ones: all of those that the passes could use are taken to be used. */
  const fill = (sizes: readonly number[], capacityOf: (date: number) => number) => {
    const least = leastBins(sizes, dates.map(capacityOf));
    return least === Infinity ? 0 : Math.max(0, least - dates.filter((date) => certain.has(date)).length);
  };
  const minutes = passes.map((pass) => pass.minutes);
  const byMinutes = fill(minutes, (date) => mostOnDate(problem, model, passes, date));
  const sung = passes.map((pass) => pass.voice.find((voice) => voice.person === person)?.minutes ?? 0);
  const limit = model.voice;
  const byVoice = limit === null ? 0 : fill(sung, () => limit);
  return certain.size + Math.max(apart, byMinutes, byVoice);
}

/** The most minutes of passes that a person can have on one date: their windows while a room is open, their longest day, time for meals. */
function mostOnDate(problem: Problem, person: PersonModel, passes: readonly PassModel[], date: number): Minutes {
  const rooms = new Set(passes.map((pass) => pass.room));
  const open = merged(problem.days.filter((day) => rooms.has(day.room) && day.dateIndex === date));
  const most = (spans: readonly Span[]) => {
    if (spans.length === 0) return 0;
    const length = Math.min(person.day ?? Infinity, spans.at(-1)!.to - spans[0]!.from);
    return Math.min(total(spans), mostOfDay(problem.rules, length));
  };
  if (person.windows === null) return most(open);
  if (person.away !== null) return most(common(open, person.windows));
  return Math.max(0, ...person.windows.map((window) => most(common(open, [window]))));
}

/**
 * The least minutes that a person spends in windows that are only a maybe: those of each pass where it overlaps the sure ones most, for
 * passes of one person never run at once, and those of the events that name them.
 */
export function leastMaybe(problem: Problem, person: number, passes: readonly PassModel[]): Minutes {
  const { windows, sure, events } = problem.people[person]!;
  if (windows === null || sure === null) return 0;
  const unsure = (from: number, to: number) => within(windows, from, to) - within(sure, from, to);
  const held = merged(events.map((event) => problem.events[event]!)).reduce((sum, span) => sum + unsure(span.from, span.to), 0);
  return held + passes.reduce((sum, pass) => sum + leastUnsure(pass, sure, unsure), 0);
}

/** The overlap with windows changes its slope only where an end of the pass meets an end of a window, so those starts are enough. */
function leastUnsure(pass: PassModel, sure: readonly Span[], unsure: (from: number, to: number) => Minutes): Minutes {
  const bends = sure.flatMap(({ from, to }) => [from, to, from - pass.minutes, to - pass.minutes]);
  const starts = pass.starts.flatMap(({ from, to }) => [from, to, ...bends.filter((start) => start > from && start < to)]);
  if (starts.length === 0) return 0;
  return starts.reduce((least, start) => Math.min(least, unsure(start, start + pass.minutes)), Infinity);
}

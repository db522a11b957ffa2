import type { Presence } from '../contracts/values';
import type { WallDate, WallTime } from '../domain/flavours';
import { daysFromEpoch, writeDate } from './wall';

/**
 * Windows as people write them, one to a line: `8 Mar 14–18`, `8–9 Mar`, `maybe 10 Mar from 12:30`, `8 Mar 20–02`,
 * `8 Mar 14:00 – 9 Mar 02:00`. No text and `always` both mean that nothing was said (free throughout); `never` is an empty list.
 */

export interface WindowFault {
  /** Counts from 1. */
  line: number;
  /** What was typed, as it was typed. */
  text: string;
  expected: string;
}
export interface ReadWindows {
  /** Undefined where there is no limit. */
  windows: Presence[] | undefined;
  faults: WindowFault[];
}

const EXPECTED = 'a day and hours, such as 8 Mar 14–18, 8–9 Mar, 8 Mar from 12:30 or maybe 10 Mar 10–20';
const MONTHS = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'];
const WEEKDAYS = ['sun', 'mon', 'tue', 'wed', 'thu', 'fri', 'sat'];
const DAY = 1440;

/** Days since 1970-01-01, or a sentence that says what is wrong with the date. */
type ReadDay = number | string;

const dayNumber = (date: WallDate): number => {
  const [year = 1970, month = 1, day = 1] = date.split('-').map(Number);
  return daysFromEpoch(year, month, day);
};
const weekdayOf = (days: number): number => (((days + 4) % 7) + 7) % 7;

function dayOf(day: number, month: number, year: number): number | undefined {
  const days = daysFromEpoch(year, month, day);
  const [, m, d] = writeDate(days).split('-').map(Number);
  return day >= 1 && m === month && d === day ? days : undefined;
}

/** The day of that name nearest to the production's own days, so that a turn of the year needs no year typed. */
function nearest(day: number, month: number, around: number): number | undefined {
  const year = Number(writeDate(around).slice(0, 4));
  const candidates = [year - 1, year, year + 1].flatMap((one) => dayOf(day, month, one) ?? []);
  return candidates.reduce<number | undefined>(
    (best, one) => (best === undefined || Math.abs(one - around) < Math.abs(best - around) ? one : best),
    undefined,
  );
}

const ISO = String.raw`(\d{4})-(\d\d)-(\d\d)`;
const WEEKDAY = String.raw`(?:(sun|mon|tue|wed|thu|fri|sat)[a-z]*[.,]?\s+)?`;
const MONTH = String.raw`([a-z]{3,9})\.?`;
const YEAR = String.raw`(?:\s+(\d{4}))?`;
const DASH = String.raw`\s*(?:-|–|—|to)\s*`;
const ISO_DAY = new RegExp(`^${ISO}`, 'i');
const ISO_RANGE = new RegExp(`^${ISO}${DASH}${ISO}`, 'i');
const DAYS_IN_MONTH = new RegExp(String.raw`^${WEEKDAY}(\d{1,2})${DASH}${WEEKDAY}(\d{1,2})\s+${MONTH}${YEAR}(?![\w:])`, 'i');
const DAYS_ACROSS = new RegExp(
  String.raw`^${WEEKDAY}(\d{1,2})\s+${MONTH}${YEAR}${DASH}${WEEKDAY}(\d{1,2})\s+${MONTH}${YEAR}(?![\w:])`,
  'i',
);
const ONE_DAY = new RegExp(String.raw`^${WEEKDAY}(\d{1,2})\s+${MONTH}${YEAR}(?![\w:])`, 'i');

interface ReadDays {
  first: ReadDay;
  last: ReadDay;
  rest: string;
}

function namedDay(weekday: string | undefined, day: string, monthName: string, year: string | undefined, around: number): ReadDay {
  const month = MONTHS.indexOf(monthName.slice(0, 3).toLowerCase()) + 1;
  if (month === 0) return `a month such as Mar (not ${monthName})`;
  const days = year === undefined ? nearest(Number(day), month, around) : dayOf(Number(day), month, Number(year));
  if (days === undefined) return `a date that exists (there is no ${day} ${monthName})`;
  const is = weekdayOf(days);
  if (weekday !== undefined && WEEKDAYS[is] !== weekday.slice(0, 3).toLowerCase()) {
    const name = (WEEKDAYS[is] ?? '').replace(/^./, (letter) => letter.toUpperCase());
    return `the right weekday (${day} ${monthName} ${writeDate(days).slice(0, 4)} is a ${name}), or none`;
  }
  return days;
}

const isoDay = (year: string, month: string, day: string): ReadDay =>
  dayOf(Number(day), Number(month), Number(year)) ?? `a date that exists (there is no ${year}-${month}-${day})`;

/** The day or days at the beginning of a text. */
function readDays(text: string, around: number): ReadDays | undefined {
  const range = ISO_RANGE.exec(text);
  if (range) {
    const [all, y1 = '', m1 = '', d1 = '', y2 = '', m2 = '', d2 = ''] = range;
    return { first: isoDay(y1, m1, d1), last: isoDay(y2, m2, d2), rest: text.slice(all.length) };
  }
  const iso = ISO_DAY.exec(text);
  if (iso) {
    const day = isoDay(iso[1] ?? '', iso[2] ?? '', iso[3] ?? '');
    return { first: day, last: day, rest: text.slice(iso[0].length) };
  }
  const across = DAYS_ACROSS.exec(text);
  if (across) {
    const [all, w1, d1 = '', m1 = '', y1, w2, d2 = '', m2 = '', y2] = across;
    return { first: namedDay(w1, d1, m1, y1 ?? y2, around), last: namedDay(w2, d2, m2, y2, around), rest: text.slice(all.length) };
  }
  const inMonth = DAYS_IN_MONTH.exec(text);
  if (inMonth) {
    const [all, w1, d1 = '', w2, d2 = '', month = '', year] = inMonth;
    return { first: namedDay(w1, d1, month, year, around), last: namedDay(w2, d2, month, year, around), rest: text.slice(all.length) };
  }
  const one = ONE_DAY.exec(text);
  if (!one) return undefined;
  const [all, weekday, day = '', month = '', year] = one;
  const read = namedDay(weekday, day, month, year, around);
  return { first: read, last: read, rest: text.slice(all.length) };
}

const CLOCK = String.raw`(\d{1,2})(?:[:.h](\d\d))?`;
const HOURS = new RegExp(String.raw`^\s*,?\s*${CLOCK}${DASH}${CLOCK}$`, 'i');
const FROM = new RegExp(String.raw`^\s*,?\s*(?:from|after)\s+${CLOCK}$`, 'i');
const UNTIL = new RegExp(String.raw`^\s*,?\s*(?:until|till|before)\s+${CLOCK}$`, 'i');
const ON_TO = new RegExp(String.raw`^\s*,?\s*${CLOCK}${DASH}(.+?)\s*,?\s*${CLOCK}$`, 'i');

/** Minutes after midnight, 24:00 included. */
function clockOf(hours: string | undefined, minutes: string | undefined): number | undefined {
  const h = Number(hours);
  const m = Number(minutes ?? 0);
  return m < 60 && (h < 24 || (h === 24 && m === 0)) ? h * 60 + m : undefined;
}

const CLOCK_EXPECTED = 'a time from 0:00 to 24:00';
const wall = (days: number, minutes: number): WallTime => {
  const day = days + Math.floor(minutes / DAY);
  const rest = minutes % DAY;
  return `${writeDate(day)}T${String(Math.floor(rest / 60)).padStart(2, '0')}:${String(rest % 60).padStart(2, '0')}`;
};

interface Span {
  days: number;
  from: number;
  /** Minutes after the midnight of `days`. */
  to: number;
}

/** The hours after the days; a sentence where they cannot be read. */
function readHours(first: number, last: number, rest: string, around: number): Span[] | string {
  const each = (from: number, to: number): Span[] =>
    Array.from({ length: last - first + 1 }, (_, index) => ({ days: first + index, from, to }));
  if (rest.trim() === '') return [{ days: first, from: 0, to: (last - first + 1) * DAY }];
  const from = FROM.exec(rest);
  if (from) {
    const start = clockOf(from[1], from[2]);
    return start === undefined || start === DAY ? CLOCK_EXPECTED : each(start, DAY);
  }
  const until = UNTIL.exec(rest);
  if (until) {
    const end = clockOf(until[1], until[2]);
    return end === undefined || end === 0 ? CLOCK_EXPECTED : each(0, end);
  }
  const hours = HOURS.exec(rest);
  if (hours) {
    const start = clockOf(hours[1], hours[2]);
    const end = clockOf(hours[3], hours[4]);
    if (start === undefined || end === undefined || start === DAY) return CLOCK_EXPECTED;
    if (start === end) return 'two different times';
    return each(start, end > start ? end : end + DAY);
  }
  const onTo = ON_TO.exec(rest);
  const there = onTo && first === last ? readDays(onTo[3] ?? '', around) : undefined;
  if (!onTo || !there || there.rest.trim() !== '') return EXPECTED;
  if (typeof there.first === 'string') return there.first;
  const start = clockOf(onTo[1], onTo[2]);
  const end = clockOf(onTo[4], onTo[5]);
  if (start === undefined || end === undefined) return CLOCK_EXPECTED;
  const to = (there.first - first) * DAY + end;
  return to > start ? [{ days: first, from: start, to }] : 'an end after its beginning';
}

function readLine(text: string, around: number): Presence[] | string {
  const maybe = /^maybe\b[:,]?\s*|\s*[,(]?\s*\bmaybe\)?$/i;
  const sure = !maybe.test(text);
  const bare = text.replace(maybe, '').trim();
  const days = readDays(bare, around);
  if (!days) return EXPECTED;
  if (typeof days.first === 'string') return days.first;
  if (typeof days.last === 'string') return days.last;
  if (days.last < days.first) return 'a last day after the first one';
  if (days.last - days.first > 366) return 'at most a year in one line';
  const spans = readHours(days.first, days.last, days.rest, around);
  if (typeof spans === 'string') return spans;
  return spans.map((span) => ({ from: wall(span.days, span.from), to: wall(span.days, span.to), ...(sure ? {} : { sure: false }) }));
}

/**
 * Reads windows, one to a line (or between semicolons). A day without a year is the one nearest to `around`, a day of the production.
 * Lines that are not understood are faults, and keep their text.
 */
export function readWindows(text: string, around: WallDate): ReadWindows {
  const lines = text.split(/[\n;]/).map((line) => line.trim());
  const said = lines.filter((line) => line !== '');
  if (said.length === 0 || (said.length === 1 && /^always$/i.test(said[0] ?? ''))) return { windows: undefined, faults: [] };
  if (said.length === 1 && /^never$/i.test(said[0] ?? '')) return { windows: [], faults: [] };
  const windows: Presence[] = [];
  const faults: WindowFault[] = [];
  lines.forEach((line, index) => {
    if (line === '') return;
    const read = readLine(line, dayNumber(around));
    if (typeof read === 'string') faults.push({ line: index + 1, text: line, expected: read });
    else windows.push(...read);
  });
  return { windows, faults };
}

import { Temporal } from 'temporal-polyfill';
import type { Minute, Minutes, WallDate, WallTime } from '../domain/flavours';

/**
 * Wall clock ↔ elapsed minutes of one time zone. Elapsed minutes count from 1970-01-01T00:00Z, so differences are true lengths across
 * a clock change. A repeated time of the autumn is the first one, as in RFC 5545 section 3.3.5; a time that the spring gap skips is
 * shown by no clock and is told apart as a fault.
 */
export interface ZoneClock {
  readonly zone: string;
  /** The minute of a wall time, or `gap` when no clock of the zone ever shows it. */
  minuteOf(wall: WallTime): Minute | 'gap';
  wallOf(minute: Minute): WallTime;
  dateOf(minute: Minute): WallDate;
  /** Minutes that the zone is ahead of UTC at that minute. */
  offsetAt(minute: Minute): Minutes;
}

/** A wall time that no clock of the zone shows. */
export class SkippedTimeError extends RangeError {
  constructor(
    readonly wall: WallTime,
    readonly zone: string,
  ) {
    super(`${wall} does not exist in ${zone}: the clock is put forward over it`);
    this.name = 'SkippedTimeError';
  }
}

const MINUTE_MS = 60_000;
const DAY: Minutes = 1440;
/** The days that the calendar of the proleptic Gregorian year can hold in four digits. */
const FIRST: Minute = -62_167_219_200 / 60;
const LAST: Minute = 253_402_300_800 / 60 - 1;

const pad = (value: number, digits = 2) => String(value).padStart(digits, '0');

/** Minutes of a wall time read as if it were UTC. */
function readAsUtc(wall: WallTime): number {
  const match = /^(\d{4})-(\d\d)-(\d\d)T(\d\d):(\d\d)$/.exec(wall);
  if (!match) throw new RangeError(`not a wall-clock time: ${wall}`);
  const [year, month, day, hour, minute] = match.slice(1).map(Number) as [number, number, number, number, number];
  return daysFromEpoch(year, month, day) * DAY + hour * 60 + minute;
}

/** Days from 1970-01-01 to a date of the Gregorian calendar (March-based year, so that the leap day is the last one). */
export function daysFromEpoch(year: number, month: number, day: number): number {
  const y = month > 2 ? year : year - 1;
  const dayOfYear = Math.floor((153 * (month > 2 ? month - 3 : month + 9) + 2) / 5) + day - 1;
  return 365 * y + Math.floor(y / 4) - Math.floor(y / 100) + Math.floor(y / 400) + dayOfYear - 719_468;
}

/** The date so many days after 1970-01-01. */
export function writeDate(days: number): WallDate {
  const shifted = days + 719_468;
  const era = Math.floor(shifted / 146_097);
  const dayOfEra = shifted - era * 146_097;
  const yearOfEra = Math.floor(
    (dayOfEra - Math.floor(dayOfEra / 1460) + Math.floor(dayOfEra / 36_524) - Math.floor(dayOfEra / 146_096)) / 365,
  );
  const dayOfYear = dayOfEra - (365 * yearOfEra + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100));
  const shiftedMonth = Math.floor((5 * dayOfYear + 2) / 153);
  const month = shiftedMonth < 10 ? shiftedMonth + 3 : shiftedMonth - 9;
  const year = yearOfEra + era * 400 + (month <= 2 ? 1 : 0);
  return `${pad(year, 4)}-${pad(month)}-${pad(dayOfYear - Math.floor((153 * shiftedMonth + 2) / 5) + 1)}`;
}

/** A stretch of time in which the zone keeps one offset. */
interface Stretch {
  from: Minute;
  /** First minute of the next stretch. */
  to: Minute;
  offset: Minutes;
}

/** The stretch around a minute, from the engine's own copy of the IANA data. Offsets of old local mean times are rounded to minutes. */
function stretchAround(minute: Minute, zone: string): Stretch {
  const there = Temporal.Instant.fromEpochMilliseconds(minute * MINUTE_MS).toZonedDateTimeISO(zone);
  const next = there.getTimeZoneTransition('next');
  const before = there.add({ nanoseconds: 1 }).getTimeZoneTransition('previous');
  return {
    from: before ? Math.ceil(before.epochMilliseconds / MINUTE_MS) : -Infinity,
    to: next ? Math.ceil(next.epochMilliseconds / MINUTE_MS) : Infinity,
    offset: Math.round(there.offsetNanoseconds / (MINUTE_MS * 1e6)),
  };
}

/**
 * A converter of one zone that looks each stretch between two clock changes up once.
 * @param zone an IANA zone that the engine knows; another one throws a RangeError at the first use.
 */
export function zoneClock(zone: string): ZoneClock {
  const known: Stretch[] = [];
  let last: Stretch | undefined;

  const stretchAt = (minute: Minute): Stretch => {
    const within = Math.min(Math.max(minute, FIRST), LAST);
    if (last && last.from <= within && within < last.to) return last;
    last = known.find((stretch) => stretch.from <= within && within < stretch.to);
    if (!last) {
      last = stretchAround(within, zone);
      known.push(last);
    }
    return last;
  };
  const offsetAt = (minute: Minute) => stretchAt(minute).offset;

  const minuteOf = (wall: WallTime): Minute | 'gap' => {
    const local = readAsUtc(wall);
    // No offset reaches a day, so every stretch that could show this wall time begins or lasts within a day of it.
    for (let at = local - DAY; at <= local + DAY;) {
      const stretch = stretchAt(at);
      const minute = local - stretch.offset;
      if (stretch.from <= minute && minute < stretch.to) return minute;
      if (stretch.to === Infinity) break;
      at = stretch.to;
    }
    return 'gap';
  };
  const localOf = (minute: Minute) => minute + offsetAt(minute);
  const dateOf = (minute: Minute): WallDate => writeDate(Math.floor(localOf(minute) / DAY));
  const wallOf = (minute: Minute): WallTime => {
    const local = localOf(minute);
    const days = Math.floor(local / DAY);
    const rest = local - days * DAY;
    return `${writeDate(days)}T${pad(Math.floor(rest / 60))}:${pad(rest % 60)}`;
  };
  return { zone, minuteOf, wallOf, dateOf, offsetAt };
}

/**
 * The minute of one wall time; `zoneClock` is the fast way for many.
 * @throws SkippedTimeError when no clock of the zone shows it.
 */
export function toMinute(wall: WallTime, zone: string): Minute {
  const minute = zoneClock(zone).minuteOf(wall);
  if (minute === 'gap') throw new SkippedTimeError(wall, zone);
  return minute;
}

/** The wall time of one minute; `zoneClock` is the fast way for many. */
export function toWall(minute: Minute, zone: string): WallTime {
  return zoneClock(zone).wallOf(minute);
}

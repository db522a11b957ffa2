import type { Presence } from '../contracts/values';
import type { WallDate, WallTime } from '../domain/flavours';
import { daysFromEpoch, writeDate } from './wall';

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const HALF_YEAR = 180;

interface Parts {
  days: number;
  day: number;
  month: string;
  year: number;
  clock: string;
}

function partsOf(wall: WallTime): Parts {
  const [year = 1970, month = 1, day = 1] = wall.slice(0, 10).split('-').map(Number);
  return { days: daysFromEpoch(year, month, day), day, month: MONTHS[month - 1] ?? '', year, clock: wall.slice(11, 16) };
}

/** `14:00` → `14`, `14:30` stays: hours as people say them. */
const shortClock = (clock: string): string => (clock.endsWith(':00') ? String(Number(clock.slice(0, 2))) : clock.replace(/^0(?=\d:)/, ''));

/** A day, with its year only where the nearest day of that name would be another one. */
function dayWords(at: Parts, around: number): string {
  const plain = `${at.day} ${at.month}`;
  return Math.abs(at.days - around) < HALF_YEAR ? plain : `${plain} ${at.year}`;
}

const dayAfter = (days: number): WallDate => writeDate(days + 1);

/** Hours of one day, of the night after it, or to the end of it. */
function hoursWords(from: Parts, to: Parts): string | undefined {
  const midnight = to.days === from.days + 1 && to.clock === '00:00';
  if (midnight) return from.clock === '00:00' ? '' : ` from ${shortClock(from.clock)}`;
  const night = to.days === from.days + 1 && to.clock <= from.clock;
  if (to.days !== from.days && (!night || to.clock === from.clock)) return undefined;
  if (from.clock === '00:00') return ` until ${shortClock(to.clock)}`;
  return ` ${shortClock(from.clock)}–${shortClock(to.clock)}`;
}

function daysWords(first: Parts, last: Parts, around: number): string {
  if (first.days === last.days) return dayWords(first, around);
  const plain = first.month === last.month && first.year === last.year;
  return plain ? `${first.day}–${dayWords(last, around)}` : `${dayWords(first, around)} – ${dayWords(last, around)}`;
}

/** One window that covers whole days, or lies across days in a way of its own. */
function longWords(from: Parts, to: Parts, around: number): string {
  if (from.clock === '00:00' && to.clock === '00:00') return daysWords(from, partsOf(`${writeDate(to.days - 1)}T00:00`), around);
  return `${dayWords(from, around)} ${shortClock(from.clock)} – ${dayWords(to, around)} ${shortClock(to.clock)}`;
}

interface Line {
  first: Parts;
  last: Parts;
  hours: string | undefined;
  to: Parts;
  sure: boolean;
}

/**
 * Windows as people write them, one to a line; the same hours on days that follow one another share a line. `readWindows` reads them
 * back to the same windows. `around` is a day of the production.
 */
export function windowLines(windows: readonly Presence[], around: WallDate): string[] {
  const near = partsOf(`${around}T00:00`).days;
  const lines: Line[] = [];
  for (const window of windows) {
    const from = partsOf(window.from);
    const to = partsOf(window.to);
    const hours = hoursWords(from, to);
    const sure = window.sure !== false;
    const before = lines.at(-1);
    const goesOn = before?.hours && before.hours === hours && before.sure === sure && dayAfter(before.last.days) === writeDate(from.days);
    if (before && goesOn) before.last = from;
    else lines.push({ first: from, last: from, hours, to, sure });
  }
  return lines.map(({ first, last, hours, to, sure }) => {
    const words = hours === undefined ? longWords(first, to, near) : daysWords(first, last, near) + hours;
    return sure ? words : `maybe ${words}`;
  });
}

/** All windows as text to be edited: nothing where there is no limit, `never` where there is none left. */
export function writeWindows(windows: readonly Presence[] | undefined, around: WallDate): string {
  if (!windows) return '';
  return windows.length === 0 ? 'never' : windowLines(windows, around).join('\n');
}

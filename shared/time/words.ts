import type { Minutes, WallDate, WallTime } from '../domain/flavours';
import { daysFromEpoch } from './wall';

/** Times in words for the page and the sheets. They depend on no locale and no zone: a wall time is what the clock on the wall shows. */

const WEEKDAYS = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat'];
const MONTHS = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December'];

/** `2027-03-08T12:30` → `12:30`. */
export function clock(wall: WallTime): string {
  return wall.slice(11, 16);
}

/** `2027-03-08T12:30` → `2027-03-08`. */
export function dateOfWall(wall: WallTime): WallDate {
  return wall.slice(0, 10);
}

/** `2027-03-08` → `Mon 8 March`. */
export function dayWords(date: WallDate): string {
  const [year = 0, month = 1, day = 1] = date.split('-').map(Number);
  const weekday = (((daysFromEpoch(year, month, day) + 4) % 7) + 7) % 7;
  return `${WEEKDAYS[weekday]} ${day} ${MONTHS[month - 1]}`;
}

/** 75 → `1 h 15`, 120 → `2 h`, 45 → `45 min`; a negative length carries a minus sign. */
export function length(minutes: Minutes): string {
  const sign = minutes < 0 ? '−' : '';
  const total = Math.abs(minutes);
  const hours = Math.floor(total / 60);
  const rest = total % 60;
  if (hours === 0) return `${sign}${rest} min`;
  return rest === 0 ? `${sign}${hours} h` : `${sign}${hours} h ${String(rest).padStart(2, '0')}`;
}

import type { Minute, Minutes } from '../domain/flavours';
import { EVER, NEVER, type GridStretch, type Span } from './model';

/** The first grid point of a room-day at or after a minute, or `EVER`. */
export function gridAtOrAfter(grid: readonly GridStretch[], step: Minutes, minute: Minute): Minute {
  for (const { from, to, phase } of grid) {
    if (minute > to) continue;
    if (minute <= from) return from;
    const over = (minute - phase) % step;
    return over === 0 ? minute : minute + step - over;
  }
  return EVER;
}

/** The last grid point of a room-day at or before a minute, or `NEVER`. */
export function gridAtOrBefore(grid: readonly GridStretch[], step: Minutes, minute: Minute): Minute {
  for (let i = grid.length - 1; i >= 0; i--) {
    const { from, to, phase } = grid[i]!;
    if (minute < from) continue;
    if (minute >= to) return to;
    return minute - ((minute - phase) % step);
  }
  return NEVER;
}

/** The first minute at or after one that a wall clock can name: repeated times of the autumn are passed over. */
export function nameable(hidden: readonly Span[], minute: Minute): Minute {
  for (const { from, to } of hidden) if (from <= minute && minute < to) return to;
  return minute;
}

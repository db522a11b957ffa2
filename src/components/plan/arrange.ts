import type { PlanDay } from '../../../shared/planner/day';
import { columns, leastWidth } from '../../../templates/drawing/layout';

/** A day with the width it is drawn at. */
export interface ArrangedDay {
  day: PlanDay;
  width: number;
}

export const DAY_GAP = 22;
const MOST = { firstRoom: 440, room: 150 };
/** A day without work is only words. */
const EMPTY = 150;

export const isEmpty = (day: PlanDay): boolean => day.items.length === 0;

function wanted(day: PlanDay, width: number): { least: number; most: number } {
  if (isEmpty(day)) return { least: EMPTY, most: EMPTY };
  const least = Math.min(width, leastWidth(day, 'screen'));
  return { least, most: Math.max(least, MOST.firstRoom + (columns(day).length - 1) * MOST.room) };
}

/** Sets days side by side in rows of a width, in order: as many to a row as can be read, the room left over shared among them. */
export function arrangeDays(days: readonly PlanDay[], width: number): ArrangedDay[][] {
  const rows: PlanDay[][] = [];
  let taken = 0;
  for (const day of days) {
    const { least } = wanted(day, width);
    const row = rows.at(-1);
    if (row && taken + DAY_GAP + least <= width) {
      row.push(day);
      taken += DAY_GAP + least;
    } else {
      rows.push([day]);
      taken = least;
    }
  }
  return rows.map((row) => shareOut(row, width));
}

function shareOut(row: PlanDay[], width: number): ArrangedDay[] {
  const arranged = row.map((day) => ({ day, width: wanted(day, width).least }));
  let left = width - DAY_GAP * (row.length - 1) - arranged.reduce((sum, one) => sum + one.width, 0);
  let growing = arranged.filter((one) => one.width < wanted(one.day, width).most);
  while (left >= growing.length && growing.length > 0) {
    const share = Math.floor(left / growing.length);
    for (const one of growing) {
      const more = Math.min(share, wanted(one.day, width).most - one.width);
      one.width += more;
      left -= more;
    }
    growing = growing.filter((one) => one.width < wanted(one.day, width).most);
  }
  return arranged;
}

import type { Pass, ProductionFile } from '../../shared/contracts/resources';

/** A production with two rooms, four people and three days, and nothing to do. Rules that a test does not speak of are switched off. */
export function emptyProduction(passes: Pass[] = [], more: Partial<ProductionFile> = {}): ProductionFile {
  const days = ['08', '09', '10'].map((day) => hours(day, '10:00', '20:00'));
  return {
    production: {
      code: 'REED',
      title: 'Reed Beds',
      timezone: 'Europe/Lisbon',
      rules: { meal: 0, breakAfter: 0, wrap: 0, listen: 0, reserve: 0, turnaround: 0 },
    },
    rooms: [
      { id: 'a', name: 'Room A', open: structuredClone(days) },
      { id: 'b', name: 'Room B', open: structuredClone(days) },
    ],
    people: [
      { id: 'mara', name: 'Mara Quill' },
      { id: 'tobin', name: 'Tobin Ash' },
      { id: 'lys', name: 'Lys Marrow' },
      { id: 'oka', name: 'Oka Dunne' },
    ],
    gear: [],
    setups: [],
    changeovers: [],
    songs: [],
    events: [],
    ...more,
    passes,
  };
}

/** A pass of an hour in Room A that nobody has to be at. */
export function aPass(id: string, more: Partial<Pass> = {}): Pass {
  return { id, room: 'a', minutes: 60, ...more };
}

/** A window on a day of March 2027. */
export const hours = (day: string, from: string, to: string) => ({ from: `2027-03-${day}T${from}`, to: `2027-03-${day}T${to}` });

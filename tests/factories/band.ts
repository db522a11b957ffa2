import type { ProductionFile } from '../../shared/contracts/resources';
import { fileOf, rowsOf } from '../../shared/domain/changes';
import type { Edit } from '../../shared/domain/edits';
import { rowKey, rowsAfter, type Rows } from '../../src/stores/optimism';

/** A production of two songs, as small as one can be and still have basics, overdubs and a shared pass. */
export function smallBand(passes?: ProductionFile['passes']): ProductionFile {
  return {
    production: { code: 'HEDGE', title: 'Hedgerow', timezone: 'Europe/Lisbon' },
    rooms: [{ id: 'a', name: 'Room A', open: [{ from: '2027-03-08T10:00', to: '2027-03-08T20:00' }] }],
    people: [
      { id: 'mara', name: 'Mara Quill' },
      { id: 'tobin', name: 'Tobin Rush' },
      { id: 'oka', name: 'Oka Lind' },
      { id: 'lys', name: 'Lys Ander' },
    ],
    gear: [],
    setups: [{ id: 'kit', name: 'Full kit', room: 'a', rig: 120 }],
    changeovers: [],
    songs: [
      {
        id: 's1',
        code: 'S01',
        title: 'Weir Song',
        parts: [
          { id: 'drums', name: 'Drums', players: ['tobin'], mode: 'live', minutes: [40, 60, 90] },
          { id: 'lead', name: 'Lead', players: ['mara'], mode: 'guide' },
          { id: 'sax', name: 'Sax', players: ['oka'], mode: 'overdub', minutes: [30, 45, 70] },
          { id: 'trumpet', name: 'Trumpet', players: ['lys'], mode: 'overdub' },
        ],
      },
      { id: 's2', code: 'S02', title: 'Ropewalk', free: true, parts: [{ id: 'lead', name: 'Lead', players: ['mara'], mode: 'live' }] },
    ],
    ...(passes ? { passes } : {}),
    events: [],
  };
}

/** The band with its passes written: basics of both songs, and one pass for both horns. */
export const writtenBand = (): ProductionFile =>
  smallBand([
    {
      id: 's1-basics',
      song: 's1',
      parts: ['drums', 'lead'],
      people: ['tobin', 'mara'],
      minutes: [40, 60, 90],
      setup: 'kit',
      note: 'loud one first',
    },
    {
      id: 's1-horns',
      song: 's1',
      parts: ['sax', 'trumpet'],
      people: ['oka', 'lys'],
      minutes: [30, 45, 70],
      after: [{ pass: 's1-basics' }],
    },
    {
      id: 's2-basics',
      song: 's2',
      parts: ['lead'],
      people: ['mara'],
      minutes: 75,
      after: [{ pass: 's1-horns', kind: 'approved' }],
      apart: ['s1-horns'],
    },
  ]);

/** The production after edits, by way of rows, as the app and the server hold it. */
export function edited(file: ProductionFile, edits: Edit[]): ProductionFile {
  const rows: Rows = new Map(
    rowsOf(file).map((row, position) => [rowKey(row.resource, row.key), { ...row, position, revision: 1, removed: false }]),
  );
  return fileOf([...rowsAfter(rows, edits, 2).values()]);
}

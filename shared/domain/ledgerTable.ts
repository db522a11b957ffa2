import type { Part, Pass, ProductionFile, Song } from '../contracts/resources';
import type { PartMode } from '../contracts/values';
import { effectivePasses, estimateOf } from '../planner/derive';
import type { Estimate } from './durations';
import type { Minutes, PartId, PassId, SongId } from './flavours';
import { partName } from './sheets/names';

/** The arrangement ledger: songs as rows, parts as columns; a cell says how that part of that song is captured. */

/** The letter that is typed and shown for each mode. */
export const MODE_LETTERS: Readonly<Record<PartMode, string>> = {
  live: 'L',
  guide: 'G',
  overdub: 'O',
  double: 'D',
  stack: 'S',
  repair: 'R',
};
export const MODES = Object.keys(MODE_LETTERS) as PartMode[];

/** A mode in words, as it is read out and shown in the detail. */
export const MODE_WORDS: Readonly<Record<PartMode, string>> = {
  live: 'live, kept',
  guide: 'guide, to be replaced',
  overdub: 'overdub',
  double: 'double',
  stack: 'stack of voices',
  repair: 'repair',
};

/** Names a column: the part's name in small letters, with a number where one song has two parts of that name. */
export type ColumnKey = string;
export interface LedgerColumn {
  key: ColumnKey;
  name: string;
  /** Likely minutes of the passes that this part leads, over all songs. */
  minutes: Minutes;
}

export interface LedgerCell {
  part: Part;
  /** The pass that captures it: written, or derived. Absent where no pass does. */
  pass: PassId | null;
  /** Low, likely, high of that pass where this part leads it; the other parts of a pass are played in the same minutes. */
  minutes: Estimate | null;
  /** Names of the parts that are played in the same pass. */
  together: string[];
  /** What wants to be looked at, in two words. */
  alarm: string | null;
}

export interface LedgerRow {
  song: Song;
  cells: ReadonlyMap<ColumnKey, LedgerCell>;
  /** Likely minutes of all passes of the song. */
  minutes: Minutes;
  /** What wants to be looked at in the song itself. */
  alarm: string | null;
}

export interface Ledger {
  columns: LedgerColumn[];
  rows: LedgerRow[];
  minutes: Minutes;
  parts: number;
  passes: number;
}

const capital = (name: string): string => name.charAt(0).toUpperCase() + name.slice(1);

/** The column that a name falls into. */
export const columnKey = (name: string): ColumnKey => name.trim().toLowerCase();

/** The column of each part of a song, in the song's order. */
export function columnsOfSong(song: Song): Map<PartId, { key: ColumnKey; name: string }> {
  const seen = new Map<string, number>();
  return new Map(
    (song.parts ?? []).map((part) => {
      const name = capital(partName(part));
      const plain = columnKey(name);
      const count = (seen.get(plain) ?? 0) + 1;
      seen.set(plain, count);
      return [part.id, count === 1 ? { key: plain, name } : { key: `${plain} ${count}`, name: `${name} ${count}` }];
    }),
  );
}

/** The part of a song in a column. */
export function partInColumn(song: Song, column: ColumnKey): Part | undefined {
  const columns = columnsOfSong(song);
  return (song.parts ?? []).find((part) => columns.get(part.id)?.key === column);
}

/** All columns: what a song adds stands after the part before it in that song. */
function unionOfColumns(songs: Song[]): { key: ColumnKey; name: string }[] {
  const columns: { key: ColumnKey; name: string }[] = [];
  for (const song of songs) {
    let at = columns.length;
    for (const column of columnsOfSong(song).values()) {
      const known = columns.findIndex(({ key }) => key === column.key);
      if (known >= 0) at = known + 1;
      else columns.splice(at++, 0, column);
    }
  }
  return columns;
}

/**
 * Columns in the order in which they stood, each once; what is new stands after the column it follows in `next`. A column that is no
 * longer in `next` keeps its place.
 */
export function columnsInOrder<Column extends { key: ColumnKey }>(before: readonly Column[], next: readonly Column[]): Column[] {
  const columns = before.filter((column, index) => before.findIndex(({ key }) => key === column.key) === index);
  let at = 0;
  for (const column of next) {
    const known = columns.findIndex(({ key }) => key === column.key);
    if (known >= 0) at = known + 1;
    else columns.splice(at++, 0, column);
  }
  return columns;
}

function cellAlarm(song: Song, part: Part): string | null {
  if (!part.mode) return null;
  if ((part.players ?? []).length === 0) return 'nobody';
  // A part that is added to a free tempo has nothing to lock to until a map is made from the take.
  if (song.free && !song.click && ['overdub', 'double', 'stack'].includes(part.mode)) return 'no map';
  return null;
}

/** Levels 0 and 1 are rehearsed first, not recorded (common practice, no source). */
const READY_TO_RECORD = 2;

function rowOf(song: Song, passes: Pass[]): LedgerRow {
  const columns = columnsOfSong(song);
  const parts = song.parts ?? [];
  const cells = new Map<ColumnKey, LedgerCell>();
  for (const part of parts) {
    const column = columns.get(part.id);
    if (!column) continue;
    const carrying = passes.filter((pass) => pass.parts?.includes(part.id));
    const led = carrying.find((pass) => leaderOf(pass, song) === part.id);
    const pass = led ?? carrying[0];
    cells.set(column.key, {
      part,
      pass: pass?.id ?? null,
      minutes: led ? estimateOf(led.minutes) : null,
      together: (pass?.parts ?? []).flatMap((id) => (id === part.id ? [] : (columns.get(id)?.name ?? []))),
      alarm: cellAlarm(song, part),
    });
  }
  const rehearse = song.rehearsal !== undefined && song.rehearsal < READY_TO_RECORD;
  const minutes = passes.reduce((sum, pass) => sum + estimateOf(pass.minutes)[1], 0);
  return { song, cells, minutes, alarm: rehearse ? 'rehearse first' : null };
}

/** The part whose column stands first among those of a pass; it shows the minutes of them all. */
export function leaderOf(pass: Pick<Pass, 'parts'>, song: Song): PartId | undefined {
  return (song.parts ?? []).find((part) => pass.parts?.includes(part.id))?.id;
}

/** The ledger of a production, from its songs and its effective passes. */
export function ledgerOf(file: ProductionFile): Ledger {
  const passes = effectivePasses(file);
  const passesOf = new Map<SongId, Pass[]>();
  for (const pass of passes) if (pass.song) passesOf.set(pass.song, [...(passesOf.get(pass.song) ?? []), pass]);
  const rows = file.songs.map((song) => rowOf(song, passesOf.get(song.id) ?? []));
  const columns = unionOfColumns(file.songs).map(({ key, name }) => ({
    key,
    name,
    minutes: rows.reduce((sum, row) => sum + (row.cells.get(key)?.minutes?.[1] ?? 0), 0),
  }));
  return {
    columns,
    rows,
    minutes: rows.reduce((sum, row) => sum + row.minutes, 0),
    parts: rows.reduce((sum, row) => sum + row.cells.size, 0),
    passes: passes.length,
  };
}

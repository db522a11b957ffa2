import type { ProductionFile, Song } from '../contracts/resources';
import { partKey } from './changes';
import { edit, type Edit } from './edits';
import type { SongId } from './flavours';
import { freeId, nextCode } from './ids';
import { type ColumnKey, partInColumn } from './ledgerTable';
import { dropParts, dropSong } from './passUpkeep';

/** Edits of whole rows and columns of the arrangement ledger. */

/** Fields of a song that are set (`null` clears one). */
export type SongFields = { [Field in Exclude<keyof Song, 'id' | 'parts' | 'extra'>]?: Song[Field] | null };

/** A new song at the end, with the next code. Gives its id too, so that the page can go there. */
export function changesForNewSong(file: ProductionFile, title: string): { id: SongId; edits: Edit[] } {
  const id = freeId(
    title,
    file.songs.map((song) => song.id),
    'song',
  );
  const code = nextCode(file.songs.flatMap((song) => song.code ?? []));
  return { id, edits: [edit.create('songs', id, { code, title: title.trim() })] };
}

export const changesForSong = (id: SongId, fields: SongFields): Edit[] => [edit.update('songs', id, fields)];

/** Removes a song with its parts and passes; empty where there is no such song. */
export function changesForSongRemoval(file: ProductionFile, id: SongId): Edit[] {
  const song = file.songs.find((candidate) => candidate.id === id);
  return song ? dropSong(file, song) : [];
}

/** Gives the part of a column another name in every song. */
export function changesForColumnName(file: ProductionFile, column: ColumnKey, name: string): Edit[] {
  return file.songs.flatMap((song) => {
    const part = partInColumn(song, column);
    return part ? [edit.update('parts', partKey(song.id, part.id), { name: name.trim() })] : [];
  });
}

/** Removes the parts of a column from every song. */
export function changesForColumnRemoval(file: ProductionFile, column: ColumnKey): Edit[] {
  const leaving = new Map(
    file.songs.flatMap((song) => {
      const part = partInColumn(song, column);
      return part ? [[song.id, new Set([part.id])] as const] : [];
    }),
  );
  return leaving.size > 0 ? dropParts(file, leaving) : [];
}

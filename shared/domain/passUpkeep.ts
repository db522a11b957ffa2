import type { Dependency, Part, Pass, ProductionFile, Song } from '../contracts/resources';
import { basicsId, partPassId } from '../planner/derive';
import { partKey } from './changes';
import { edit, type Edit } from './edits';
import type { PartId, PassId, PersonId, SongId } from './flavours';

/** What becomes of passes when parts or songs go: they let the parts go, and nothing else of the production names what is no more. */

export type PartsOfSongs = ReadonlyMap<SongId, ReadonlySet<PartId>>;

/** People of a pass without those who were there for the leaving parts alone, and with those who come. */
export function peopleAfter(pass: Pass, song: Song | undefined, leaving: ReadonlySet<PartId>, coming: PersonId[] = []): PersonId[] {
  const parts = song?.parts ?? [];
  const players = (which: (id: PartId) => boolean) =>
    new Set(parts.filter((part) => which(part.id) && pass.parts?.includes(part.id)).flatMap((part) => part.players ?? []));
  const going = players((id) => leaving.has(id));
  const staying = players((id) => !leaving.has(id));
  return [...new Set([...(pass.people ?? []).filter((person) => staying.has(person) || !going.has(person)), ...coming])];
}

/** Patches by pass or part key, so that a row is updated once. */
type Patches = Map<string, Edit['fields']>;
const patch = (patches: Patches, key: string, fields: Edit['fields']): void => void patches.set(key, { ...patches.get(key), ...fields });

/** Edits that take parts out of the written passes that carry them; a pass that held nothing else is removed. */
export function leave(file: ProductionFile, leaving: PartsOfSongs): Edit[] {
  const patches: Patches = new Map();
  const gone = new Set<PassId>();
  for (const pass of file.passes ?? []) {
    const parts = pass.song === undefined ? undefined : leaving.get(pass.song);
    if (!parts || !pass.parts?.some((part) => parts.has(part))) continue;
    const rest = pass.parts.filter((part) => !parts.has(part));
    if (rest.length === 0) gone.add(pass.id);
    else {
      const song = file.songs.find((candidate) => candidate.id === pass.song);
      patch(patches, pass.id, { parts: rest, people: peopleAfter(pass, song, parts) });
    }
  }
  forgetPasses(file, gone, patches);
  return [
    ...[...patches].filter(([id]) => !gone.has(id)).map(([id, fields]) => edit.update('passes', id, fields)),
    ...[...gone].map((id) => edit.remove('passes', id)),
  ];
}

const names = (need: Dependency, gone: ReadonlySet<PassId>): boolean => 'pass' in need && gone.has(need.pass);
const orNull = <Item>(list: Item[]): Item[] | null => (list.length > 0 ? list : null);

/** Takes passes that are gone out of what the other written passes say about them. */
function forgetPasses(file: ProductionFile, gone: ReadonlySet<PassId>, patches: Patches): void {
  if (gone.size === 0) return;
  for (const pass of file.passes ?? []) {
    if (pass.after?.some((need) => names(need, gone)))
      patch(patches, pass.id, { after: orNull(pass.after.filter((need) => !names(need, gone))) });
    if (pass.before?.some((what) => 'pass' in what && gone.has(what.pass)))
      patch(patches, pass.id, { before: orNull(pass.before.filter((what) => !('pass' in what && gone.has(what.pass)))) });
    for (const field of ['together', 'apart'] as const) {
      const others = pass[field];
      if (others?.some((id) => gone.has(id))) patch(patches, pass.id, { [field]: orNull(others.filter((id) => !gone.has(id))) });
    }
  }
}

/** The ids that derived passes of these parts had; nothing may go on naming them. */
function derivedIds(file: ProductionFile, leaving: PartsOfSongs): Set<PassId> {
  const ids = new Set<PassId>();
  for (const song of file.songs) {
    const parts = leaving.get(song.id);
    if (!parts) continue;
    for (const part of parts) ids.add(partPassId(song.id, part));
    const basics = (song.parts ?? []).filter((part) => part.mode === 'live' || part.mode === 'guide');
    if (basics.every((part) => parts.has(part.id))) ids.add(basicsId(song.id));
  }
  return ids;
}

/** Removes parts of songs, and keeps passes and the other parts' dependencies in step. */
export function dropParts(file: ProductionFile, leaving: PartsOfSongs): Edit[] {
  const passes = leave(file, leaving);
  const removed = passes.flatMap(({ op, key }) => (op === 'remove' ? [key] : []));
  const gone = file.passes ? new Set(removed) : derivedIds(file, leaving);
  const others = file.songs.flatMap((song) =>
    (song.parts ?? []).flatMap((part): Edit[] => {
      if (leaving.get(song.id)?.has(part.id) || !part.after?.some((need) => names(need, gone))) return [];
      return [edit.update('parts', partKey(song.id, part.id), { after: orNull(part.after.filter((need) => !names(need, gone))) })];
    }),
  );
  const parts = [...leaving].flatMap(([song, ids]) => [...ids].map((id) => edit.remove('parts', partKey(song, id))));
  return [...passes, ...others, ...parts];
}

/** Removes a song with its parts and its passes. */
export function dropSong(file: ProductionFile, song: Song): Edit[] {
  const leaving: PartsOfSongs = new Map([[song.id, new Set((song.parts ?? []).map((part: Part) => part.id))]]);
  // Passes of the song that carry none of its parts go as well: they are taken for passes of all of them.
  const all = new Set((song.parts ?? []).map((part) => part.id));
  const bare = (file.passes ?? []).map((pass) => (pass.song === song.id ? { ...pass, parts: [...all] } : pass));
  const edits = all.size > 0 ? dropParts({ ...file, ...(file.passes ? { passes: bare } : {}) }, leaving) : [];
  return [...edits, edit.remove('songs', song.id)];
}

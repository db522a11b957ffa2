import type { Dependency, Part, Pass, ProductionFile, Song } from '../contracts/resources';
import type { PartMode, ThreePoint } from '../contracts/values';
import { basicsId, effectivePasses, estimateOf, partPassId } from '../planner/derive';
import { partKey } from './changes';
import { edit, type Edit } from './edits';
import type { PartId, PersonId, SongId } from './flavours';
import { freeId } from './ids';
import { type ColumnKey, columnKey, columnsOfSong, leaderOf, partInColumn } from './ledgerTable';
import { dropParts, leave, peopleAfter } from './passUpkeep';

/**
 * What an edit in the ledger changes. Where passes are derived from the parts, the parts are all there is to write. Where passes are
 * written, those that carry the part are kept in step: its players come and go, its minutes follow, a new part joins the song's
 * basics (live, guide) or gets a pass of its own, and a pass that held nothing but a removed part goes with it, together with what
 * other passes said about it. Everything else somebody wrote into a pass stays.
 */

/** Fields of a part that are set (`null` clears one). */
export type PartFields = { [Field in Exclude<keyof Part, 'id' | 'extra'>]?: Part[Field] | null };
export type CellEdit = { mode: PartMode | null } | { minutes: number | null } | { fields: PartFields };

const isBasic = (mode: PartMode | null | undefined): boolean => mode === 'live' || mode === 'guide';

const songOf = (file: ProductionFile, id: SongId): Song | undefined => file.songs.find((song) => song.id === id);

/** The production as its parts alone would have it. */
const derivedPasses = (file: ProductionFile): Pass[] => effectivePasses({ ...file, passes: undefined });

const carries = (pass: Pass, song: SongId, part: PartId): boolean => pass.song === song && (pass.parts ?? []).includes(part);

/** The file with one part of a song put in place (or appended). */
function withPart(file: ProductionFile, songId: SongId, part: Part): ProductionFile {
  const songs = file.songs.map((song) => {
    if (song.id !== songId) return song;
    const parts = song.parts ?? [];
    const known = parts.some(({ id }) => id === part.id);
    return { ...song, parts: known ? parts.map((other) => (other.id === part.id ? part : other)) : [...parts, part] };
  });
  return { ...file, songs };
}

/**
 * Edits for one cell. `partName` names the column (see `columnsOfSong`), in any writing. `remembered` is a part that stood in the cell
 * before it was removed; it comes back with all it had.
 * Empty where there is nothing to change, or no such song.
 */
export function changesForCell(file: ProductionFile, songId: SongId, partName: string, wanted: CellEdit, remembered?: Part): Edit[] {
  const song = songOf(file, songId);
  if (!song) return [];
  const part = partInColumn(song, columnKey(partName));
  if ('mode' in wanted) {
    if (wanted.mode === null) return part ? dropParts(file, new Map([[songId, new Set([part.id])]])) : [];
    if (!part) return addPart(file, song, partName.trim(), wanted.mode, remembered);
    return part.mode === wanted.mode ? [] : changeMode(file, song, part, wanted.mode);
  }
  if (!part) return [];
  return 'minutes' in wanted ? changeMinutes(file, song, part, wanted.minutes) : changeFields(file, song, part, wanted.fields);
}

/** The players who most often play this part in the other songs. */
function usualPlayers(file: ProductionFile, column: ColumnKey): PersonId[] {
  const counts = new Map<string, { players: PersonId[]; times: number }>();
  for (const song of file.songs) {
    const players = partInColumn(song, column)?.players ?? [];
    if (players.length === 0) continue;
    const key = players.join(' ');
    counts.set(key, { players, times: (counts.get(key)?.times ?? 0) + 1 });
  }
  return [...counts.values()].reduce((most, one) => (one.times > most.times ? one : most), { players: [] as PersonId[], times: 0 }).players;
}

function addPart(file: ProductionFile, song: Song, name: string, mode: PartMode, remembered?: Part): Edit[] {
  const players = usualPlayers(file, columnKey(name));
  const named = displayName(file, name);
  const taken = (song.parts ?? []).map((part) => part.id);
  const fresh: Part = { id: freeId(named, taken, 'part'), name: named, mode, ...(players.length > 0 ? { players } : {}) };
  const part = remembered && !taken.includes(remembered.id) ? { ...remembered, mode } : fresh;
  const { id, ...fields } = part;
  return [edit.create('parts', partKey(song.id, id), fields), ...enter(withPart(file, song.id, part), song.id, part)];
}

/** The column's name as the other songs write it. */
function displayName(file: ProductionFile, name: string): string {
  const key = columnKey(name);
  for (const song of file.songs) for (const column of columnsOfSong(song).values()) if (column.key === key) return column.name;
  return name;
}

/** Written passes take a part in: into the song's basics where it is played live, else as a pass of its own. */
function enter(after: ProductionFile, songId: SongId, part: Part): Edit[] {
  if (!after.passes) return [];
  const song = songOf(after, songId);
  const basics = isBasic(part.mode) ? after.passes.find((pass) => isBasicsOf(pass, song)) : undefined;
  if (basics) {
    const people = [...new Set([...(basics.people ?? []), ...(part.players ?? [])])];
    return [edit.update('passes', basics.id, { parts: [...(basics.parts ?? []), part.id], people })];
  }
  const wanted = isBasic(part.mode) ? basicsId(songId) : partPassId(songId, part.id);
  const made = derivedPasses(after).find((pass) => pass.id === wanted);
  if (!made) return [];
  const { id, ...fields } = made;
  const written = after.passes;
  // The derived pass waits for the derived basics; the written ones may have another name, or there may be none.
  const standing = written.find((pass) => isBasicsOf(pass, song))?.id;
  const follows = (fields.after ?? []).flatMap((need): Dependency[] => {
    if (!('pass' in need) || written.some((pass) => pass.id === need.pass)) return [need];
    return standing && need.pass === basicsId(songId) ? [{ ...need, pass: standing }] : [];
  });
  const free = freeId(
    id,
    written.map((pass) => pass.id),
    id,
  );
  return [edit.create('passes', free, { ...fields, after: follows.length > 0 ? follows : undefined })];
}

/** Whether a written pass takes the song's live and guide parts: it holds at least one of them. */
function isBasicsOf(pass: Pass, song: Song | undefined): boolean {
  if (!song || pass.song !== song.id) return false;
  if (pass.id === basicsId(song.id)) return true;
  return (song.parts ?? []).some((part) => isBasic(part.mode) && (pass.parts ?? []).includes(part.id));
}

function changeMode(file: ProductionFile, song: Song, part: Part, mode: PartMode): Edit[] {
  const set = edit.update('parts', partKey(song.id, part.id), { mode });
  if (!file.passes) return [set];
  const after = withPart(file, song.id, { ...part, mode });
  const moves = isBasic(part.mode) !== isBasic(mode) || part.mode === undefined;
  if (!moves) return [set, ...followMinutes(file, after, song, part.id)];
  const left = leave(file, new Map([[song.id, new Set([part.id])]]));
  const gone = new Set(left.flatMap(({ resource, op, key }) => (resource === 'passes' && op === 'remove' ? [key] : [])));
  const standing = { ...after, passes: file.passes.filter((pass) => !gone.has(pass.id)).map((pass) => patched(pass, left)) };
  return [set, ...mergeUpdates([...left, ...enter(standing, song.id, { ...part, mode })])];
}

/** A pass as it stands after the edits that name it. */
function patched(pass: Pass, edits: Edit[]): Pass {
  return edits.reduce(
    (made, { resource, op, key, fields }) => (resource === 'passes' && op === 'update' && key === pass.id ? { ...made, ...fields } : made),
    pass,
  );
}

/** One update per row: later fields win. */
function mergeUpdates(edits: Edit[]): Edit[] {
  const made: Edit[] = [];
  for (const one of edits) {
    const at = made.findIndex(
      (other) => other.op === 'update' && one.op === 'update' && other.resource === one.resource && other.key === one.key,
    );
    const before = made[at];
    if (before) made[at] = { ...before, fields: { ...before.fields, ...one.fields } };
    else made.push(one);
  }
  return made;
}

/** Where a written pass of this part alone had the minutes that its part gave, it takes those that the part gives now. */
function followMinutes(before: ProductionFile, after: ProductionFile, song: Song, part: PartId): Edit[] {
  const pass = before.passes?.find((candidate) => carries(candidate, song.id, part) && candidate.parts?.length === 1);
  const id = partPassId(song.id, part);
  const was = derivedPasses(before).find((derived) => derived.id === id)?.minutes;
  const is = derivedPasses(after).find((derived) => derived.id === id)?.minutes;
  if (!pass || was === undefined || is === undefined || String(pass.minutes) !== String(was) || String(was) === String(is)) return [];
  return [edit.update('passes', pass.id, { minutes: is })];
}

/** The range moves with its middle: 30 · 45 · 70 with 60 typed becomes 40 · 60 · 95, in steps of five. */
function scaled(range: ThreePoint, likely: number): ThreePoint {
  const [low, middle, high] = estimateOf(range);
  if (low === high) return likely;
  const toFive = (minutes: number): number => Math.max(1, Math.round(minutes / 5) * 5);
  return [Math.min(likely, toFive((low * likely) / middle)), likely, Math.max(likely, toFive((high * likely) / middle))];
}

/** Minutes belong to the pass: they stand with the part that leads it, and with no other part of it. */
function changeMinutes(file: ProductionFile, song: Song, part: Part, likely: number | null): Edit[] {
  const carrying = effectivePasses(file).filter((pass) => carries(pass, song.id, part.id));
  const pass = carrying.find((one) => leaderOf(one, song) === part.id) ?? carrying[0];
  const leader = (pass && leaderOf(pass, song)) ?? part.id;
  const range = pass?.minutes ?? part.minutes;
  const minutes = likely === null ? null : range === undefined ? likely : scaled(range, likely);
  const others = (song.parts ?? []).filter(
    (other) => other.id !== leader && other.minutes !== undefined && pass?.parts?.includes(other.id),
  );
  const edits = [
    edit.update('parts', partKey(song.id, leader), { minutes }),
    ...others.map((other) => edit.update('parts', partKey(song.id, other.id), { minutes: null })),
  ];
  if (!file.passes || !pass) return edits;
  return [...edits, ...passMinutes(file, song, pass, leader, minutes)];
}

function passMinutes(file: ProductionFile, song: Song, pass: Pass, leader: PartId, minutes: ThreePoint | null): Edit[] {
  if (minutes !== null) return [edit.update('passes', pass.id, { minutes })];
  const bare = (song.parts ?? []).map((part) => (pass.parts?.includes(part.id) ? { ...part, minutes: undefined } : part));
  const derived = derivedPasses({ ...file, songs: file.songs.map((other) => (other.id === song.id ? { ...song, parts: bare } : other)) });
  const usual = derived.find((one) => one.song === song.id && one.parts?.includes(leader))?.minutes;
  return usual === undefined ? [] : [edit.update('passes', pass.id, { minutes: usual })];
}

/** What a pass of one part takes over as the part says it. */
const SHARED = ['room', 'setup', 'priority', 'loud', 'quiet', 'voice', 'uses'] as const satisfies (keyof Part & keyof Pass)[];

function changeFields(file: ProductionFile, song: Song, part: Part, fields: PartFields): Edit[] {
  const edits = [edit.update('parts', partKey(song.id, part.id), fields)];
  for (const pass of file.passes ?? []) {
    if (!carries(pass, song.id, part.id)) continue;
    const patch: Edit['fields'] = {};
    if (fields.players !== undefined) patch.people = peopleAfter(pass, song, new Set([part.id]), fields.players ?? []);
    if (pass.parts?.length === 1) {
      for (const field of SHARED) if (fields[field] !== undefined) patch[field] = fields[field];
      if (fields.minutes) patch.minutes = fields.minutes;
    } else if (fields.minutes && leaderOf(pass, song) === part.id) patch.minutes = fields.minutes;
    if (Object.keys(patch).length > 0) edits.push(edit.update('passes', pass.id, patch));
  }
  return edits;
}

import type { Part, Pass, ProductionFile, SessionEvent } from '../contracts/resources';
import { effectivePasses } from '../planner/derive';
import { HEAD } from './changes';
import { edit, type Edit } from './edits';
import type { PassId } from './flavours';
import { partName, partsOf } from './sheets/names';

/** How a pass is called on the page and on paper: `S01` and `Weir Song`, or `S01` and `horns`. */
export interface PassName {
  /** The song's code, or its id where it has none; null for work that belongs to no song. */
  code: string | null;
  /** The song's title where its live parts are played together, else the parts that are added. */
  label: string;
  /** For a reader who does not see the code: `Weir Song, horns`. */
  full: string;
}

/** An id as words: `lead-vocal` → `lead vocal`. */
const asWords = (id: string): string => id.replaceAll('-', ' ');

export const eventName = (event: SessionEvent): string => event.name ?? event.kind ?? asWords(event.id);

const isLive = (part: Part): boolean => part.mode === 'live' || part.mode === 'guide';

/** Words for playing together, which the title alone says as well. */
const TOGETHER: ReadonlySet<string> = new Set(['basics', 'live']);

/** What a name says beyond the song's title: `Weir Song horns` → `horns`; the title alone, or its basics, stay the title. */
function beyondTitle(name: string, title: string | null): string {
  if (title === null || !name.toLowerCase().startsWith(title.toLowerCase())) return name;
  const beyond = name.slice(title.length);
  if (/^[\p{L}\p{N}]/u.test(beyond)) return name;
  const rest = beyond.replace(/^[\s:,–-]+/, '');
  return rest === '' || TOGETHER.has(rest.toLowerCase()) ? title : rest;
}

/** The name of a pass: its own, else the song's title for the parts that are played together, else the added parts. */
export function passName(file: Pick<ProductionFile, 'songs'>, pass: Pass): PassName {
  const song = pass.song === undefined ? undefined : file.songs.find(({ id }) => id === pass.song);
  const code = song ? (song.code ?? song.id) : null;
  const title = song ? (song.title ?? song.code ?? asWords(song.id)) : null;
  const parts = partsOf(pass, song);
  const added = parts.length > 0 && !parts.some(isLive) ? parts.map(partName).join(', ') : null;
  const own = pass.name === undefined ? undefined : beyondTitle(pass.name, title);
  const label = own ?? added ?? title ?? asWords(pass.id);
  return { code, label, full: title === null || label === title ? label : `${title}, ${label}` };
}

/** Code and label in one line, for sentences. */
export function passInWords(file: Pick<ProductionFile, 'songs'>, pass: Pass): string {
  const { code, label } = passName(file, pass);
  return code === null ? label : `${code} ${label}`;
}

/**
 * What to write before one pass can be pinned or left out while all of them are derived: every pass, so that none is lost.
 * Nothing where passes are written already.
 */
export function editsToWritePasses(file: ProductionFile): Edit[] {
  if (file.passes) return [];
  const head = edit.update('production', HEAD, { passesByHand: true });
  return [head, ...effectivePasses(file).map((pass) => edit.create('passes', pass.id, { ...pass }))];
}

/** Edits that set fields of one pass (null clears one), writing all passes first where they are derived. */
export function editsToSetPass(file: ProductionFile, id: PassId, fields: Edit['fields']): Edit[] {
  return [...editsToWritePasses(file), edit.update('passes', id, fields)];
}

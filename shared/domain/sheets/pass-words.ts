import type { PlanItem } from '../../contracts/plan';
import type { Part, ProductionFile } from '../../contracts/resources';
import type { PartMode } from '../../contracts/values';
import { passName } from '../passes';
import { type Names, partName, partsOf, songWords } from './names';

/** A pass as a sheet says it. */
export interface PassWords {
  /** Code of the song, empty where there is none. */
  code: string;
  /** Title of the song, else what the pass is called. */
  title: string;
  /** What the pass's own name says beyond the title. */
  own: string;
  parts: Part[];
}

export function passWords(file: ProductionFile, item: PlanItem, names: Names): PassWords {
  const pass = names.pass(item.id);
  const song = names.song(pass?.song);
  if (!pass || !song) return { code: '', title: pass?.name ?? item.id ?? '', own: '', parts: [] };
  const words = songWords(song);
  const { label } = passName(file, pass);
  return { ...words, own: pass.name === undefined || label === words.title ? '' : label, parts: partsOf(pass, song) };
}

/** A part by its name; a part that is called like its mode by its instrument, so that nobody reads `guide: guide`. */
function partWord(part: Part): string {
  const name = partName(part);
  return name === part.mode ? (part.instrument ?? name) : name;
}

const MODE_ORDER: PartMode[] = ['live', 'guide', 'overdub', 'double', 'stack', 'repair'];

/** `live: drums, bass · guide: lead vocal`. Parts without a mode stand last, without a label. */
export function partsInWords(parts: readonly Part[]): string {
  const groups = MODE_ORDER.flatMap((mode) => {
    const words = parts.filter((part) => part.mode === mode).map(partWord);
    return words.length > 0 ? [`${mode}: ${words.join(', ')}`] : [];
  });
  const others = parts.filter((part) => part.mode === undefined).map(partWord);
  return [...groups, ...(others.length > 0 ? [others.join(', ')] : [])].join(' · ');
}

/** One person's parts: `lead vocal, guide · shaker, live`. */
export function ownParts(parts: readonly Part[]): string {
  return parts
    .map((part) => (part.mode === undefined || partWord(part) === part.mode ? partWord(part) : `${partWord(part)}, ${part.mode}`))
    .join(' · ');
}

/** What is done in a pass: its parts, and before them what its own name says beyond the title. */
export function taskOf({ own, parts }: PassWords): string {
  const words = partsInWords(parts);
  return [words.includes(own) ? '' : own, words].filter((text) => text !== '').join(' · ');
}

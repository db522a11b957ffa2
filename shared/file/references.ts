import { basicsId, partPassId } from '../planner/derive';
import { fieldOf, type Fields, itemsOf, type Path, valuesAt } from './paths';
import type { PathFault } from './yaml';

export const LISTS = ['rooms', 'people', 'gear', 'setups', 'changeovers', 'songs', 'passes', 'events'] as const;
export type ListName = (typeof LISTS)[number];
type NamedList = Exclude<ListName, 'changeovers'>;

/** What an id of each list is called in a fault. */
const ONE_OF: Record<NamedList, string> = {
  rooms: 'a room',
  people: 'a person',
  gear: 'a piece of gear',
  setups: 'a set-up',
  songs: 'a song',
  passes: 'a pass',
  events: 'an event',
};

/** Every field that names something else of the file: the list it stands in, the pattern below an item, the list it names. */
const REFERENCES: [list: ListName, pattern: string, names: NamedList][] = [
  ['rooms', 'hears[]', 'rooms'],
  ['rooms', 'operators[]', 'people'],
  ['setups', 'room', 'rooms'],
  ['setups', 'ready{}', 'people'],
  ['changeovers', 'from', 'setups'],
  ['changeovers', 'to', 'setups'],
  ['songs', 'room', 'rooms'],
  ['songs', 'setup', 'setups'],
  ['songs', 'parts[].players[]', 'people'],
  ['songs', 'parts[].room', 'rooms'],
  ['songs', 'parts[].setup', 'setups'],
  ['songs', 'parts[].voice{}', 'people'],
  ['songs', 'parts[].uses[].gear', 'gear'],
  ['songs', 'parts[].after[].pass', 'passes'],
  ['songs', 'parts[].after[].event', 'events'],
  ['passes', 'song', 'songs'],
  ['passes', 'people[]', 'people'],
  ['passes', 'room', 'rooms'],
  ['passes', 'setup', 'setups'],
  ['passes', 'voice{}', 'people'],
  ['passes', 'uses[].gear', 'gear'],
  ['passes', 'after[].pass', 'passes'],
  ['passes', 'after[].event', 'events'],
  ['passes', 'before[].pass', 'passes'],
  ['passes', 'before[].event', 'events'],
  ['passes', 'together[]', 'passes'],
  ['passes', 'apart[]', 'passes'],
  ['events', 'room', 'rooms'],
  ['events', 'people[]', 'people'],
];

/** The fields of a pass, and of a derived pass's part, that name other passes. */
const TO_PASSES = ['after[].pass', 'before[].pass', 'together[]', 'apart[]'];

const textOf = (value: unknown, key: string): string | undefined => {
  const field = fieldOf(value, key);
  return typeof field === 'string' ? field : undefined;
};

/** A pass that is derived from a part, with the place it comes from. */
interface DerivedId {
  id: string;
  path: Path;
}

/** The ids of the passes that a file without `passes` gets, in the order of its songs and parts. */
function derivedIds(root: Fields): DerivedId[] {
  return itemsOf(root.songs).flatMap((song, index) => {
    const songId = textOf(song, 'id');
    if (songId === undefined) return [];
    const at: Path = ['songs', index];
    const parts = itemsOf(fieldOf(song, 'parts'));
    const basic = parts.findIndex((part) => ['live', 'guide'].includes(textOf(part, 'mode') ?? ''));
    const added = parts.flatMap((part, position) => {
      const id = textOf(part, 'id');
      const mode = textOf(part, 'mode') ?? 'live';
      if (id === undefined || mode === 'live' || mode === 'guide') return [];
      return [{ id: partPassId(songId, id), path: [...at, 'parts', position, 'id'] }];
    });
    return basic < 0 ? added : [{ id: basicsId(songId), path: [...at, 'id'] }, ...added];
  });
}

function idsOf(root: Fields): Record<NamedList, Set<string>> {
  const of = (list: NamedList) => new Set(valuesAt(root[list], '[].id').flatMap(({ value }) => (typeof value === 'string' ? [value] : [])));
  return {
    rooms: of('rooms'),
    people: of('people'),
    gear: of('gear'),
    setups: of('setups'),
    songs: of('songs'),
    events: of('events'),
    passes: of('passes'),
  };
}

const shown = (id: string) => (id.length > 64 ? `${id.slice(0, 63)}…` : id);

/** Ids that nothing in the file has. */
export function unknownReferences(root: Fields): PathFault[] {
  const ids = idsOf(root);
  // Parts speak of the passes that are made of them, also where a written list stands in their place.
  const derived = new Set(derivedIds(root).map(({ id }) => id));
  return REFERENCES.flatMap(([list, pattern, names]) =>
    valuesAt(root[list], `[].${pattern}`, [list]).flatMap(({ path, value }) => {
      if (typeof value !== 'string' || ids[names].has(value)) return [];
      if (list === 'songs' && names === 'passes' && derived.has(value)) return [];
      return [{ path, expected: `the id of ${ONE_OF[names]}; "${shown(value)}" is none`, key: pattern.endsWith('{}') }];
    }),
  );
}

/** Ids that are given twice within their list, or within their song. */
export function repeatedIds(root: Fields): PathFault[] {
  const lists: Path[] = LISTS.filter((list) => list !== 'changeovers').map((list) => [list]);
  const parts: Path[] = itemsOf(root.songs).map((_, index) => ['songs', index, 'parts']);
  return [...lists, ...parts].flatMap((at) => {
    const first = new Map<string, number>();
    return itemsOf(
      at.reduce<unknown>((value, step) => (typeof step === 'number' ? itemsOf(value)[step] : fieldOf(value, step)), root),
    ).flatMap((item, index) => {
      const id = textOf(item, 'id');
      if (id === undefined) return [];
      const before = first.get(id);
      first.set(id, before ?? index);
      return before === undefined
        ? []
        : [{ path: [...at, index, 'id'], expected: `an id of its own; ${at.at(-1)}[${before}] has this one` }];
    });
  });
}

/** Ids of derived passes that are too long, or that two parts share. They matter only where no passes are written. */
export function derivedIdFaults(root: Fields): PathFault[] {
  if (root.passes !== undefined) return [];
  const seen = new Set<string>();
  return derivedIds(root).flatMap(({ id, path }): PathFault[] => {
    if (id.length > 64) return [{ path, expected: `ids so short that the pass made of them, ${shown(id)}, has at most 64 characters` }];
    if (seen.has(id)) return [{ path, expected: `ids that make no second pass ${id}` }];
    seen.add(id);
    return [];
  });
}

/** Passes and rooms that name themselves, and parts that wait for the pass they are in. */
export function selfReferences(root: Fields): PathFault[] {
  const ofPasses = itemsOf(root.passes).flatMap((pass, index) =>
    TO_PASSES.flatMap((pattern) => valuesAt(pass, pattern, ['passes', index]).filter(({ value }) => value === textOf(pass, 'id'))),
  );
  const ofParts = itemsOf(root.songs).flatMap((song, songIndex) =>
    itemsOf(fieldOf(song, 'parts')).flatMap((part, index) => {
      const mode = textOf(part, 'mode');
      const songId = textOf(song, 'id') ?? '';
      const own = mode === 'live' || mode === 'guide' ? basicsId(songId) : partPassId(songId, textOf(part, 'id') ?? '');
      return valuesAt(part, 'after[].pass', ['songs', songIndex, 'parts', index]).filter(({ value }) => value === own);
    }),
  );
  return [...ofPasses, ...ofParts].map(({ path }) => ({ path, expected: 'another pass than this one' }));
}

/** A pass's parts must be parts of the song it names. */
export function strangeParts(root: Fields): PathFault[] {
  const songs = new Map(itemsOf(root.songs).map((song) => [textOf(song, 'id'), song]));
  return itemsOf(root.passes).flatMap((pass, index) => {
    const songId = textOf(pass, 'song');
    const parts = valuesAt(pass, 'parts[]', ['passes', index]);
    if (songId === undefined)
      return parts.length > 0 ? [{ path: ['passes', index, 'parts'], expected: 'a `song` beside the parts, whose parts they are' }] : [];
    const song = songs.get(songId);
    if (song === undefined) return [];
    const known = new Set(valuesAt(song, 'parts[].id').map(({ value }) => value));
    return parts
      .filter(({ value }) => typeof value === 'string' && !known.has(value))
      .map(({ path, value }) => ({ path, expected: `a part of the song ${shown(songId)}; "${shown(String(value))}" is none` }));
  });
}

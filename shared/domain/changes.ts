import type { Change, Row } from '../contracts/changes';
import type { Production } from '../contracts/head';
import type {
  Changeover,
  Gear,
  Part,
  Pass,
  Person,
  ProductionFile,
  ResourceName,
  Room,
  SessionEvent,
  Setup,
  Song,
} from '../contracts/resources';

/** A production as rows and as changes: how the file's lists become rows with keys, and how rows become the file again. */

/** Key of the head row. */
export const HEAD = 'production';

export const changeoverKey = (from: string, to: string) => `${from}>${to}`;
export const partKey = (song: string, part: string) => `${song}/${part}`;

/** The list's own id of a row: the part's half of `song/part`, else the key. */
export const idOfKey = (resource: ResourceName, key: string) => (resource === 'parts' ? key.slice(key.indexOf('/') + 1) : key);

/** The song a part's key names. */
export const songOfKey = (key: string) => key.slice(0, key.indexOf('/'));

type Fields = Record<string, unknown>;
export type NewRow = Pick<Row, 'resource' | 'key' | 'fields'>;

const given = (value: object): Fields => Object.fromEntries(Object.entries(value).filter(([, field]) => field !== undefined));

/** The rows a file consists of, each list in its order and every row after those it names, but for passes that name each other. */
export function rowsOf(file: ProductionFile): NewRow[] {
  const byId = (resource: ResourceName, list: readonly { id: string }[]): NewRow[] =>
    list.map((item) => ({ resource, key: item.id, fields: given(item) }));
  const songs = file.songs.map((song): NewRow => {
    const { parts, ...head } = song;
    return { resource: 'songs', key: song.id, fields: { ...given(head), ...(parts?.length === 0 ? { parts: [] } : {}) } };
  });
  const parts = file.songs.flatMap((song) =>
    (song.parts ?? []).map((part): NewRow => ({ resource: 'parts', key: partKey(song.id, part.id), fields: given(part) })),
  );
  const head: NewRow = {
    resource: 'production',
    key: HEAD,
    fields: { ...given(file.production), ...(file.passes ? { passesByHand: true } : {}) },
  };
  return [
    head,
    ...byId('rooms', file.rooms),
    ...byId('people', file.people),
    ...byId('gear', file.gear),
    ...byId('setups', file.setups),
    ...file.changeovers.map((entry): NewRow => ({
      resource: 'changeovers',
      key: changeoverKey(entry.from, entry.to),
      fields: given(entry),
    })),
    ...byId('events', file.events),
    ...songs,
    ...parts,
    ...byId('passes', file.passes ?? []),
  ];
}

/** An import as changes: one `create` per row of the file. `newId` gives each change its UUID. */
export function changesOf(file: ProductionFile, newId: () => string): Change[] {
  return rowsOf(file).map((row) => ({ id: newId(), op: 'create', ...row }));
}

/** Rows were checked against their schema on the way in; here they only get their type back. */
const typed = <Item>(row: Pick<Row, 'fields'>) => row.fields as unknown as Item;

/**
 * The file that the rows make up: removed rows and the parts of removed songs left out, lists in the order of their positions.
 * `passes` is absent (derived from the parts) unless a pass is there or the head says that they are written by hand, so that an
 * empty list of the file stays one. Throws an Error where the head row is missing.
 */
export function fileOf(rows: readonly Row[]): ProductionFile {
  const live = rows.filter((row) => !row.removed);
  const inOrder = (resource: ResourceName) =>
    live.filter((row) => row.resource === resource).sort((a, b) => a.position - b.position || (a.key < b.key ? -1 : a.key > b.key ? 1 : 0));
  const list = <Item>(resource: ResourceName) => inOrder(resource).map((row) => typed<Item>(row));
  const head = live.find((row) => row.resource === 'production');
  if (!head) throw new Error('rows without a production head');
  const { passesByHand, ...production } = head.fields;
  const partsOf = new Map<string, Part[]>();
  for (const row of inOrder('parts')) {
    const song = songOfKey(row.key);
    partsOf.set(song, [...(partsOf.get(song) ?? []), typed<Part>(row)]);
  }
  const songs = list<Song>('songs').map((song) => {
    const parts = partsOf.get(song.id);
    return parts ? { ...song, parts } : song;
  });
  const passes = list<Pass>('passes');
  return {
    production: typed<Production>({ fields: production }),
    rooms: list<Room>('rooms'),
    people: list<Person>('people'),
    gear: list<Gear>('gear'),
    setups: list<Setup>('setups'),
    changeovers: list<Changeover>('changeovers'),
    songs,
    ...(passesByHand === true || passes.length > 0 ? { passes } : {}),
    events: list<SessionEvent>('events'),
  };
}

import type { z } from 'zod';
import type { Row } from '../contracts/changes';
import {
  changeover,
  event,
  gear,
  part,
  pass,
  person,
  production,
  type ProductionFile,
  type ResourceName,
  room,
  setup,
  song,
} from '../contracts/resources';

/** The schema of a row's fields. A song's parts are rows of their own. */
export const rowSchemas = {
  production,
  rooms: room,
  people: person,
  gear,
  setups: setup,
  changeovers: changeover,
  songs: song.omit({ parts: true }),
  parts: part,
  passes: pass,
  events: event,
} as const satisfies Record<ResourceName, z.ZodType>;
export type RowFields<Name extends ResourceName> = z.output<(typeof rowSchemas)[Name]>;

/** The halves of a part's key (`song/part`) or a changeover's (`from>to`). */
export function halvesOf(key: string, sign: '/' | '>'): [string, string] {
  const at = key.indexOf(sign);
  return at < 0 ? [key, ''] : [key.slice(0, at), key.slice(at + 1)];
}

/** What a row's key says about its fields, so that a row without them still has its identity. */
export function identityOf(resource: ResourceName, key: string): Record<string, string> {
  if (resource === 'production') return {};
  if (resource === 'parts') return { id: halvesOf(key, '/')[1] };
  if (resource === 'changeovers') {
    const [from, to] = halvesOf(key, '>');
    return { from, to };
  }
  return { id: key };
}

/** The key of a resource's row, the other way round. */
export const partKey = (songId: string, partId: string): string => `${songId}/${partId}`;
export const changeoverKey = (from: string, to: string): string => `${from}>${to}`;

/**
 * Makes a function that puts rows together to the production in the form of the file: by position, removed rows left out, parts
 * under their song, `passes` absent where none are written. A row is read once: as long as the row object is the same, so is what
 * was made from it. Throws a ZodError where a row does not hold what its contract says.
 */
export function createAssembler(): (rows: Iterable<Row>) => ProductionFile {
  const read = new WeakMap<Row, unknown>();
  function fieldsOf<Name extends ResourceName>(resource: Name, row: Row): RowFields<Name> {
    const known = read.get(row);
    // The memory holds only what this very schema answered for this very row.
    if (known !== undefined) return known as RowFields<Name>;
    const made = rowSchemas[resource].parse({ ...identityOf(resource, row.key), ...row.fields });
    read.set(row, made);
    return made as RowFields<Name>;
  }
  return (rows) => {
    const standing = new Map<ResourceName, Row[]>();
    for (const row of rows) {
      if (row.removed) continue;
      const list = standing.get(row.resource);
      if (list) list.push(row);
      else standing.set(row.resource, [row]);
    }
    const sorted = (resource: ResourceName): Row[] =>
      (standing.get(resource) ?? []).sort((a, b) => a.position - b.position || (a.key < b.key ? -1 : 1));
    const all = <Name extends ResourceName>(resource: Name): RowFields<Name>[] => sorted(resource).map((row) => fieldsOf(resource, row));

    const partsOf = new Map<string, RowFields<'parts'>[]>();
    for (const row of sorted('parts')) {
      const [songId] = halvesOf(row.key, '/');
      const list = partsOf.get(songId);
      if (list) list.push(fieldsOf('parts', row));
      else partsOf.set(songId, [fieldsOf('parts', row)]);
    }
    const head = sorted('production')[0];
    const passes = all('passes');
    return {
      production: head ? fieldsOf('production', head) : { code: '', title: '', timezone: 'UTC' },
      rooms: all('rooms'),
      people: all('people'),
      gear: all('gear'),
      setups: all('setups'),
      changeovers: all('changeovers'),
      songs: sorted('songs').map((row) => {
        const parts = partsOf.get(row.key);
        return { ...fieldsOf('songs', row), ...(parts ? { parts } : {}) };
      }),
      ...(passes.length > 0 ? { passes } : {}),
      events: all('events'),
    };
  };
}

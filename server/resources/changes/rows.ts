import { randomUUID } from 'node:crypto';
import type { Transaction, WhereOptions } from 'sequelize';
import type { Row } from '../../../shared/contracts/changes';
import { resourceNames, type ResourceName } from '../../../shared/contracts/resources';
import { changeoverKey, HEAD, partKey } from '../../../shared/domain/changes';
import { readableFields, type Reader } from '../../../shared/domain/policy';
import type { Database } from '../../models/database';
import { childNames, type ChildName } from '../../models/fields';
import type { Held, MappedModel } from '../../models/rows';
import { listsOf } from '../../models/tables';
import { readFields, writeFields, type RowFields } from './mapping';

/** A row of a production as the server works on it: in the form of the file, with its id. */
export interface KnownRow extends Omit<Row, 'fields'> {
  id: string;
  fields: RowFields;
}

const address = (resource: ResourceName, key: string) => `${resource} ${key}`;

/** All rows of one production, by id and by key. */
export class Rows {
  readonly #byKey = new Map<string, KnownRow>();
  readonly #keys = new Map<string, string>();

  add(row: KnownRow): void {
    this.#byKey.set(address(row.resource, row.key), row);
    this.#keys.set(address(row.resource, row.id), row.key);
  }
  get(resource: ResourceName, key: string): KnownRow | undefined {
    return this.#byKey.get(address(resource, key));
  }
  all(): KnownRow[] {
    return [...this.#byKey.values()];
  }
  readonly keyOf = (resource: ResourceName, id: string): string | undefined => this.#keys.get(address(resource, id));
  readonly idOf = (resource: ResourceName, key: string): string | undefined => this.get(resource, key)?.id;

  /** A copy in which rows can be changed without touching these. */
  copy(): Rows {
    const rows = new Rows();
    for (const row of this.all()) rows.add({ ...row });
    return rows;
  }
}

/** The order in which rows can be read and written: one comes after those its key or its references name. */
export const ORDER: readonly ResourceName[] = [
  'production',
  'rooms',
  'people',
  'gear',
  'setups',
  'changeovers',
  'events',
  'songs',
  'parts',
  'passes',
];

type Entries = Map<string, Held[]>;

/** What a table holds of one production, as plain columns. */
async function held(model: MappedModel, where: WhereOptions<Held>, transaction: Transaction): Promise<Held[]> {
  // Sequelize types the plain answer of `raw` as models.
  return (await model.findAll({ where, raw: true, transaction })) as unknown as Held[];
}

async function loadEntries(db: Database, productionId: string, transaction: Transaction): Promise<Record<ChildName, Entries>> {
  const loaded = {} as Record<ChildName, Entries>;
  for (const name of childNames) {
    const entries = await held(db.entries[name], { productionId }, transaction);
    const byOwner: Entries = new Map();
    for (const entry of entries) {
      for (const owner of ['roomId', 'personId', 'gearId', 'setupId', 'eventId', 'partId', 'passId']) {
        const id = entry[owner];
        if (typeof id !== 'string') continue;
        const at = `${owner} ${id}`;
        const list = byOwner.get(at);
        if (list) list.push(entry);
        else byOwner.set(at, [entry]);
      }
    }
    loaded[name] = byOwner;
  }
  return loaded;
}

/** Reads every row of a production, removed ones too, as they are within the transaction. */
export async function loadRows(db: Database, productionId: string, transaction: Transaction): Promise<Rows> {
  const entries = await loadEntries(db, productionId, transaction);
  const tables = new Map<ResourceName, Held[]>();
  for (const name of resourceNames)
    tables.set(name, await held(db.rows[name], name === 'production' ? { id: productionId } : { productionId }, transaction));
  const keys = new Map<string, string>();
  const keyOf = (resource: ResourceName, id: string) => keys.get(address(resource, id));
  // Keys first: passes name one another.
  for (const name of ORDER)
    for (const columns of tables.get(name) ?? []) keys.set(address(name, String(columns.id)), keyIn(name, columns, keyOf));

  const rows = new Rows();
  for (const resource of ORDER)
    for (const columns of tables.get(resource) ?? []) {
      const id = String(columns.id);
      const lists = Object.fromEntries(
        listsOf(resource).map(([field, { table, owner, fixed }]) => [
          field,
          (entries[table].get(`${owner} ${id}`) ?? []).filter((entry) => !fixed || entry[fixed.attribute] === fixed.value),
        ]),
      );
      rows.add({
        id,
        resource,
        key: keys.get(address(resource, id)) ?? '',
        revision: Number(resource === 'production' ? columns.headRevision : columns.revision),
        position: Number(columns.position ?? 0),
        removed: (columns.removedAt ?? null) !== null,
        fields: readFields(resource, { columns, entries: lists }, keyOf),
      });
    }
  return rows;
}

function keyIn(resource: ResourceName, columns: Held, keyOf: (resource: ResourceName, id: string) => string | undefined): string {
  if (resource === 'production') return HEAD;
  if (resource === 'changeovers')
    return changeoverKey(keyOf('setups', String(columns.fromSetupId)) ?? '', keyOf('setups', String(columns.toSetupId)) ?? '');
  if (resource === 'parts') return partKey(keyOf('songs', String(columns.songId)) ?? '', String(columns.key));
  return String(columns.key);
}

const CHUNK = 1000;
const chunksOf = <Item>(items: readonly Item[]): Item[][] =>
  Array.from({ length: Math.ceil(items.length / CHUNK) }, (_, at) => items.slice(at * CHUNK, (at + 1) * CHUNK));

/** Writes these rows, new and known ones alike, with all their entries. */
export async function saveRows(
  db: Database,
  productionId: string,
  rows: Rows,
  touched: readonly KnownRow[],
  at: { now: Date; transaction: Transaction },
): Promise<void> {
  const { transaction } = at;
  const entries = new Map<ChildName, Held[]>(childNames.map((name) => [name, []]));
  for (const resource of ORDER) {
    const written = touched.filter((row) => row.resource === resource);
    if (written.length === 0) continue;
    const columns = written.map((row) => {
      const stored = writeFields(resource, row.fields, rows.idOf);
      for (const [field, { table, owner }] of listsOf(resource))
        for (const entry of stored.entries[field] ?? [])
          entries.get(table)?.push({ id: randomUUID(), productionId, [owner]: row.id, ...entry });
      return { ...stored.columns, ...identityColumns(row, rows, productionId, at.now) };
    });
    if (resource === 'production') {
      for (const head of columns) await db.rows.production.update(head, { where: { id: productionId }, transaction });
      continue;
    }
    const attributes = Object.keys(columns[0] ?? {}).filter((name) => name !== 'id');
    for (const chunk of chunksOf(columns))
      await db.rows[resource].bulkCreate(chunk, {
        updateOnDuplicate: attributes,
        conflictAttributes: ['id'],
        returning: false,
        transaction,
      });
    const owners = new Map(listsOf(resource).map(([, { table, owner }]) => [table, owner]));
    for (const [table, owner] of owners)
      for (const chunk of chunksOf(written.map((row) => row.id)))
        await db.entries[table].destroy({ where: { [owner]: chunk }, transaction });
  }
  for (const name of childNames)
    for (const chunk of chunksOf(entries.get(name) ?? [])) await db.entries[name].bulkCreate(chunk, { returning: false, transaction });
}

function identityColumns(row: KnownRow, rows: Rows, productionId: string, now: Date): Held {
  if (row.resource === 'production') return { id: row.id, headRevision: row.revision, updatedAt: now };
  const half = row.key.split('/');
  return {
    id: row.id,
    productionId,
    position: row.position,
    revision: row.revision,
    removedAt: row.removed ? now : null,
    ...(row.resource === 'changeovers' ? {} : { key: row.resource === 'parts' ? half[1] : row.key }),
    ...(row.resource === 'parts' ? { songId: rows.idOf('songs', half[0] ?? '') } : {}),
  };
}

/** Rows as this reader may see them; those they do not see at all are left out. */
export function presentRows(rows: readonly KnownRow[], reader: Reader): Row[] {
  return rows.flatMap(({ id: _id, ...row }) => {
    const fields = readableFields(reader, row.resource, row.key, row.fields);
    return fields ? [{ ...row, fields }] : [];
  });
}

import { rowSchemas } from '../../../shared/contracts/rows';
import type { ResourceName } from '../../../shared/contracts/resources';
import { idOfKey, songOfKey } from '../../../shared/domain/changes';
import { attributeOf, MINUTES, type ChildrenField, type Field, type ReferenceField, type ValueField } from '../../models/fields';
import type { Held } from '../../models/rows';
import { resourceFields } from '../../models/tables';

/** The fields of a row in the form of the file, and the columns and entries that hold them: both ways, driven by the table of fields. */

export type RowFields = Record<string, unknown>;
/** Gives the key of a row of that kind by its id, or its id by its key. */
export type Lookup = (resource: ResourceName, idOrKey: string) => string | undefined;
/** What a row consists of in the database: its columns, and per list the columns of its entries. */
export interface Stored {
  columns: Held;
  entries: Record<string, Held[]>;
}

const hasId = (resource: ResourceName) => resource !== 'production' && resource !== 'changeovers';

const isRecord = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null && !Array.isArray(value);

const isEmpty = (value: unknown) => (Array.isArray(value) ? value.length === 0 : isRecord(value) && Object.keys(value).length === 0);

// ——— from the database ———

function readMinutes(columns: Held): unknown {
  const { low, likely, high, form } = MINUTES;
  if (columns[form] === 'one') return columns[likely];
  if (columns[form] === 'single') return [columns[likely]];
  return columns[form] === 'three' ? [columns[low], columns[likely], columns[high]] : null;
}

function readInner(name: string, field: ValueField | ReferenceField, columns: Held, keyOf: Lookup, within = ''): unknown {
  const value = columns[attributeOf(name, field, within)] ?? null;
  if (value === null || field.kind === 'value') return value;
  const key = keyOf(field.to, String(value));
  return key === undefined ? null : idOfKey(field.to, key);
}

function readInners(fields: Record<string, ValueField | ReferenceField>, columns: Held, keyOf: Lookup, within = ''): RowFields {
  const read: RowFields = {};
  for (const [name, field] of Object.entries(fields)) {
    const value = readInner(name, field, columns, keyOf, within);
    if (value !== null) read[name] = value;
  }
  return read;
}

function readList(list: ChildrenField, entries: readonly Held[], keyOf: Lookup): unknown {
  if (entries.length === 0) return null;
  const read = [...entries].sort((a, b) => Number(a.position) - Number(b.position)).map((entry) => readInners(list.entry, entry, keyOf));
  if (list.form === 'entries') return read;
  if (list.form === 'keys') return read.map((entry) => entry.key);
  return Object.fromEntries(read.map((entry) => [entry.key, entry.value]));
}

function readField(name: string, field: Field, stored: Stored, keyOf: Lookup): unknown {
  switch (field.kind) {
    case 'value':
    case 'reference':
      return readInner(name, field, stored.columns, keyOf);
    case 'group': {
      const group = readInners(field.fields, stored.columns, keyOf, name);
      return isEmpty(group) ? null : group;
    }
    case 'tuple': {
      const values = field.attributes.map((attribute) => stored.columns[attribute] ?? null);
      return values.includes(null) ? null : values;
    }
    case 'minutes':
      return readMinutes(stored.columns);
    case 'children':
      return readList(field, stored.entries[name] ?? [], keyOf);
  }
}

/** The fields of a row in the form of the file, in the order of its schema. */
export function readFields(resource: ResourceName, stored: Stored, keyOf: Lookup): RowFields {
  const fields = resourceFields[resource];
  const givenEmpty = Array.isArray(stored.columns.givenEmpty) ? stored.columns.givenEmpty : [];
  const read: RowFields = {};
  for (const name of Object.keys(rowSchemas[resource].shape)) {
    const field = fields[name];
    const value = name === 'extra' ? stored.columns.extra : field ? readField(name, field, stored, keyOf) : null;
    if (value !== null && value !== undefined) read[name] = value;
    else if (givenEmpty.includes(name)) read[name] = field?.kind === 'group' || isRecordList(field) ? {} : [];
    else if (name === 'id' && hasId(resource)) read.id = stored.columns.key;
  }
  return read;
}

const isRecordList = (field: Field | undefined) => field?.kind === 'children' && field.form === 'record';

// ——— to the database ———

/** A row that another one names: the field, as a path, and the key of the row. */
export interface Named {
  to: ResourceName;
  key: string;
  path: (string | number)[];
}

const scoped = (field: ReferenceField, key: unknown, fields: RowFields) =>
  field.scope ? `${String(fields[field.scope])}/${String(key)}` : String(key);

const entriesOf = (list: ChildrenField, value: unknown): { at: string | number; entry: RowFields }[] => {
  if (list.form === 'record')
    return Object.entries(isRecord(value) ? value : {}).map(([key, number]) => ({ at: key, entry: { key, value: number } }));
  const items: unknown[] = Array.isArray(value) ? value : [];
  return items.map((item, at) => ({ at, entry: list.form === 'keys' ? { key: item } : isRecord(item) ? item : {} }));
};

/** Every row that a row names; a part names its song by its key. */
export function namedBy(resource: ResourceName, key: string, fields: RowFields): Named[] {
  const inFields = namedInFields(resource, fields);
  return resource === 'parts' ? [{ to: 'songs', key: songOfKey(key), path: ['song'] }, ...inFields] : inFields;
}

function namedInFields(resource: ResourceName, fields: RowFields): Named[] {
  return Object.entries(resourceFields[resource]).flatMap(([name, field]): Named[] => {
    const value = fields[name];
    if (value === undefined) return [];
    if (field.kind === 'reference') return [{ to: field.to, key: scoped(field, value, fields), path: [name] }];
    if (field.kind !== 'children') return [];
    return entriesOf(field, value).flatMap(({ at, entry }) =>
      Object.entries(field.entry).flatMap(([inner, reference]): Named[] => {
        if (reference.kind !== 'reference' || entry[inner] === undefined) return [];
        const path = field.form === 'entries' ? [name, at, inner] : [name, at];
        return [{ to: reference.to, key: scoped(reference, entry[inner], fields), path }];
      }),
    );
  });
}

function writeMinutes(value: unknown): Held {
  const { low, likely, high, form } = MINUTES;
  if (value === undefined) return { [low]: null, [likely]: null, [high]: null, [form]: null };
  if (!Array.isArray(value)) return { [low]: value, [likely]: value, [high]: value, [form]: 'one' };
  const [first, second = first, third = first]: unknown[] = value;
  return { [low]: first, [likely]: second, [high]: third, [form]: value.length === 1 ? 'single' : 'three' };
}

function writeInner(field: ValueField | ReferenceField, value: unknown, fields: RowFields, idOf: Lookup): unknown {
  if (value === undefined) return null;
  if (field.kind === 'value') return value;
  const id = idOf(field.to, scoped(field, value, fields));
  if (id === undefined) throw new Error(`no ${field.to} of that key: ${String(value)}`);
  return id;
}

function writeField(name: string, field: Field, fields: RowFields, idOf: Lookup): Held {
  const value = fields[name];
  switch (field.kind) {
    case 'value':
    case 'reference':
      return { [attributeOf(name, field)]: writeInner(field, value, fields, idOf) };
    case 'group':
      return Object.fromEntries(
        Object.entries(field.fields).map(([inner, column]) => [
          attributeOf(inner, column, name),
          isRecord(value) ? (value[inner] ?? null) : null,
        ]),
      );
    case 'tuple':
      return Object.fromEntries(field.attributes.map((attribute, at) => [attribute, Array.isArray(value) ? value[at] : null]));
    case 'minutes':
      return writeMinutes(value);
    case 'children':
      return {};
  }
}

/** Columns and entries for these fields. Throws an Error where a named row is not known: that is to be asked before. */
export function writeFields(resource: ResourceName, fields: RowFields, idOf: Lookup): Stored {
  const columns: Held = {
    extra: fields.extra ?? null,
    givenEmpty: Object.keys(fields).filter(
      (name) => name !== 'extra' && resourceFields[resource][name]?.kind !== 'value' && isEmpty(fields[name]),
    ),
  };
  const entries: Record<string, Held[]> = {};
  for (const [name, field] of Object.entries(resourceFields[resource])) {
    Object.assign(columns, writeField(name, field, fields, idOf));
    if (field.kind === 'children')
      entries[name] = entriesOf(field, fields[name]).map(({ entry }, position) => ({
        position,
        ...(field.fixed ? { [field.fixed.attribute]: field.fixed.value } : {}),
        ...Object.fromEntries(
          Object.entries(field.entry).map(([inner, column]) => [
            attributeOf(inner, column),
            writeInner(column, entry[inner], fields, idOf),
          ]),
        ),
      }));
  }
  return { columns, entries };
}

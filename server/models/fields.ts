import { DataTypes, type DataType } from 'sequelize';
import type { ResourceName } from '../../shared/contracts/resources';
import type { Columns } from './columns';

/**
 * Kinds of fields, and how each stands in the database. A column is null where the file does not give the field, so that import
 * and export give the same production.
 */

type Scalar = 'text' | 'whole' | 'number' | 'flag' | 'texts';
const TYPES: Record<Scalar, DataType> = {
  text: DataTypes.TEXT,
  whole: DataTypes.INTEGER,
  number: DataTypes.DOUBLE,
  flag: DataTypes.BOOLEAN,
  texts: DataTypes.ARRAY(DataTypes.TEXT),
};

/** One column; named like its field unless `attribute` says otherwise. */
export interface ValueField {
  kind: 'value';
  type: Scalar;
  attribute?: string;
}
/** A row of the same production, named by its key. `scope` names the field that holds the first half of the key (a pass's parts are those of its song). */
export interface ReferenceField {
  kind: 'reference';
  to: ResourceName;
  attribute: string;
  scope?: string;
}
/** `price: { day, overtimeHour }` as columns `price_day`, `price_overtime_hour`. */
export interface GroupField {
  kind: 'group';
  fields: Record<string, ValueField>;
}
/** `size: [9, 7, 3.2]` as one column each. */
export interface TupleField {
  kind: 'tuple';
  type: Scalar;
  attributes: string[];
}
/** Low, likely and high minutes, with the form in which the file wrote them. */
export interface MinutesField {
  kind: 'minutes';
}
/** A list or record kept in a table of its own, a row per entry. */
export interface ChildrenField {
  kind: 'children';
  table: ChildName;
  /** Column of the table that names the row which owns the entries. */
  owner: string;
  /** Which of several lists in one table. */
  fixed?: { attribute: string; value: string };
  form: 'entries' | 'keys' | 'record';
  entry: Record<string, ValueField | ReferenceField>;
}
export type Field = ValueField | ReferenceField | GroupField | TupleField | MinutesField | ChildrenField;
export type Fields = Readonly<Record<string, Field>>;

export const text: ValueField = { kind: 'value', type: 'text' };
export const whole: ValueField = { kind: 'value', type: 'whole' };
export const number: ValueField = { kind: 'value', type: 'number' };
export const flag: ValueField = { kind: 'value', type: 'flag' };
export const texts: ValueField = { kind: 'value', type: 'texts' };
export const minutes: MinutesField = { kind: 'minutes' };
export const as = (attribute: string, field: ValueField): ValueField => ({ ...field, attribute });
export const group = (fields: Record<string, ValueField>): GroupField => ({ kind: 'group', fields });
export const reference = (to: ResourceName, attribute: string, scope?: string): ReferenceField => ({
  kind: 'reference',
  to,
  attribute,
  ...(scope ? { scope } : {}),
});

type Entry = ChildrenField['entry'];
export const entries = (table: ChildName, owner: string, entry: Entry, kind?: string): ChildrenField => ({
  kind: 'children',
  table,
  owner,
  form: 'entries',
  entry,
  ...(kind ? { fixed: { attribute: 'kind', value: kind } } : {}),
});
export const keys = (table: ChildName, owner: string, key: ReferenceField, kind?: string): ChildrenField => ({
  kind: 'children',
  table,
  owner,
  form: 'keys',
  entry: { key },
  ...(kind ? { fixed: { attribute: 'kind', value: kind } } : {}),
});
export const record = (table: ChildName, owner: string, key: ReferenceField, value: ValueField): ChildrenField => ({
  kind: 'children',
  table,
  owner,
  form: 'record',
  entry: { key, value },
});

export const childNames = [
  'hours',
  'roomHears',
  'roomOperators',
  'windows',
  'gearWindows',
  'setupReady',
  'eventPeople',
  'partPlayers',
  'partVoice',
  'partUses',
  'passPeople',
  'passParts',
  'passVoice',
  'passUses',
  'passRelations',
  'dependencies',
] as const;
export type ChildName = (typeof childNames)[number];

/** Where the three minutes and the form they were written in stand. */
export const MINUTES = { low: 'minutesLow', likely: 'minutesLikely', high: 'minutesHigh', form: 'minutesForm' } as const;

const capital = (name: string) => name.charAt(0).toUpperCase() + name.slice(1);

/** The attribute of a field: its own name unless it says otherwise; a group's fields carry the group's name in front. */
export const attributeOf = (name: string, field: ValueField | ReferenceField, within = '') =>
  field.attribute ?? (within === '' ? name : `${within}${capital(name)}`);

/** The attributes of a model in which these fields stand, lists left out. */
export function attributesOf(fields: Fields): Columns {
  const attributes: Columns = {};
  for (const [name, field] of Object.entries(fields)) {
    if (field.kind === 'value') attributes[attributeOf(name, field)] = { type: TYPES[field.type] };
    else if (field.kind === 'reference') attributes[field.attribute] = { type: DataTypes.UUID };
    else if (field.kind === 'group')
      for (const [inner, value] of Object.entries(field.fields)) attributes[attributeOf(inner, value, name)] = { type: TYPES[value.type] };
    else if (field.kind === 'tuple') for (const attribute of field.attributes) attributes[attribute] = { type: TYPES[field.type] };
    else if (field.kind === 'minutes') {
      for (const attribute of [MINUTES.low, MINUTES.likely, MINUTES.high]) attributes[attribute] = { type: DataTypes.INTEGER };
      attributes[MINUTES.form] = { type: DataTypes.TEXT };
    }
  }
  return attributes;
}

/** The attributes of a table of entries, gathered from every list that is kept in it. */
export function childAttributesOf(lists: readonly ChildrenField[]): Columns {
  const attributes: Columns = { position: { type: DataTypes.INTEGER } };
  for (const { owner, fixed, entry } of lists) {
    attributes[owner] = { type: DataTypes.UUID };
    if (fixed) attributes[fixed.attribute] = { type: DataTypes.TEXT };
    for (const [name, field] of Object.entries(entry))
      attributes[attributeOf(name, field)] = { type: field.kind === 'value' ? TYPES[field.type] : DataTypes.UUID };
  }
  return attributes;
}

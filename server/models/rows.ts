import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type ModelStatic,
  type Sequelize,
} from 'sequelize';
import { resourceNames, type ResourceName } from '../../shared/contracts/resources';
import { columns, createdAt, id, maybeJson, maybeMoment, uuid, whole, words, type Columns } from './columns';
import { attributesOf, childAttributesOf, childNames, type ChildName } from './fields';
import { childLists, resourceFields, resourceTables } from './tables';

/** The head of a production, as far as services name its columns; the others are reached through the mapping of fields. */
export interface ProductionModel extends Model<InferAttributes<ProductionModel>, InferCreationAttributes<ProductionModel>> {
  id: CreationOptional<string>;
  createdBy: string;
  /** Revision of the whole production, and the one at which its head was last written. */
  revision: CreationOptional<number>;
  headRevision: CreationOptional<number>;
  code: string;
  title: string;
  timezone: string;
  updatedAt: CreationOptional<Date>;
}

/** What a row or an entry holds whose columns come from the mapping of fields. */
export type Held = Record<string, unknown>;
export type MappedModel = ModelStatic<Model<Held, Held>>;

const givenEmpty = { type: DataTypes.ARRAY(DataTypes.TEXT), allowNull: false, defaultValue: [] };
const common: Columns = { id, givenEmpty, extra: maybeJson };
const within: Columns = { ...common, productionId: uuid, position: whole, revision: whole, removedAt: maybeMoment };
const KEY: Columns = { key: words };

/** Attributes that the fields of a kind of row do not name. */
const identity: Record<ResourceName, Columns> = {
  production: {
    ...common,
    createdBy: uuid,
    revision: { ...whole, defaultValue: 0 },
    headRevision: { ...whole, defaultValue: 0 },
    updatedAt: createdAt,
  },
  rooms: { ...within, ...KEY },
  people: { ...within, ...KEY },
  gear: { ...within, ...KEY },
  setups: { ...within, ...KEY },
  changeovers: within,
  songs: { ...within, ...KEY },
  parts: { ...within, ...KEY, songId: uuid },
  passes: { ...within, ...KEY },
  events: { ...within, ...KEY },
};

const snake = (name: string) => name.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`);

export function rowModels(sequelize: Sequelize) {
  const rows = {} as Record<ResourceName, MappedModel>;
  for (const name of resourceNames)
    rows[name] = sequelize.define<Model<Held, Held>>(name, columns({ ...identity[name], ...attributesOf(resourceFields[name]) }), {
      tableName: resourceTables[name],
      timestamps: false,
    });
  const entries = {} as Record<ChildName, MappedModel>;
  for (const name of childNames)
    entries[name] = sequelize.define<Model<Held, Held>>(name, columns({ id, productionId: uuid, ...childAttributesOf(childLists[name]) }), {
      tableName: snake(name),
      timestamps: false,
    });
  return { rows, entries, productions: rows.production as unknown as ModelStatic<ProductionModel> };
}

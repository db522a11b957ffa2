import { DataTypes, type ModelAttributeColumnOptions } from 'sequelize';

export type Columns = Record<string, ModelAttributeColumnOptions>;

/** Columns as the models name them; what the database demands stands in the migrations. */
export const id = { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 };
export const uuid = { type: DataTypes.UUID, allowNull: false };
export const maybeUuid = { type: DataTypes.UUID, allowNull: true };
export const words = { type: DataTypes.TEXT, allowNull: false };
export const maybeWords = { type: DataTypes.TEXT, allowNull: true };
export const whole = { type: DataTypes.INTEGER, allowNull: false };
export const maybeWhole = { type: DataTypes.INTEGER, allowNull: true };
export const number = { type: DataTypes.DOUBLE, allowNull: false };
export const maybeNumber = { type: DataTypes.DOUBLE, allowNull: true };
export const large = { type: DataTypes.BIGINT, allowNull: false };
export const moment = { type: DataTypes.DATE, allowNull: false };
export const maybeMoment = { type: DataTypes.DATE, allowNull: true };
export const json = { type: DataTypes.JSON, allowNull: false };
export const maybeJson = { type: DataTypes.JSON, allowNull: true };
/** Filled by the database. */
export const createdAt = { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW };

/** Copies of the columns: Sequelize writes the name of the column into the very object it is given. */
export function columns<Names extends string>(
  given: Record<Names, ModelAttributeColumnOptions>,
): Record<Names, ModelAttributeColumnOptions> {
  const copies = { ...given };
  for (const name of Object.keys(copies) as Names[]) copies[name] = { ...copies[name] };
  return copies;
}

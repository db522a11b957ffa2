import { Sequelize } from 'sequelize';
import { accountModels } from './accounts';
import { associate } from './associations';
import { planModels } from './plans';
import { preparationModels } from './preparation';
import { productionModels } from './productions';
import { rowModels } from './rows';

function defineModels(sequelize: Sequelize) {
  return {
    ...accountModels(sequelize),
    ...productionModels(sequelize),
    ...planModels(sequelize),
    ...preparationModels(sequelize),
    ...rowModels(sequelize),
  };
}
export type Models = ReturnType<typeof defineModels>;
export type Database = Models & { sequelize: Sequelize; close: () => Promise<void> };

/** Opens the pool and gives the models of this very database; nothing is kept in the module. */
export function openDatabase(url: string): Database {
  const sequelize = new Sequelize(url, {
    dialect: 'postgres',
    logging: false,
    pool: { max: 10 },
    define: { underscored: true },
    // Two planners in one room: a waiting batch fails with words rather than hanging.
    dialectOptions: { statement_timeout: 30_000 },
  });
  const models = defineModels(sequelize);
  associate(models);
  return { ...models, sequelize, close: () => sequelize.close() };
}

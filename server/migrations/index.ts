import type { Sequelize } from 'sequelize';
import { SequelizeStorage, Umzug } from 'umzug';
import * as accounts from './001-accounts';
import * as productions from './002-productions';
import * as roomsPeopleGear from './003-rooms-people-gear';
import * as songsPasses from './004-songs-passes';
import * as plans from './005-plans';
import * as preparation from './006-preparation';
import * as orderOfHistory from './007-order-of-history';
import type { Step } from './support';

/** Every step in order. A name is never changed and a released step never edited: the database remembers what it has seen. */
const steps: ({ name: string } & Step)[] = [
  { name: '001-accounts', ...accounts },
  { name: '002-productions', ...productions },
  { name: '003-rooms-people-gear', ...roomsPeopleGear },
  { name: '004-songs-passes', ...songsPasses },
  { name: '005-plans', ...plans },
  { name: '006-preparation', ...preparation },
  { name: '007-order-of-history', ...orderOfHistory },
];

export function migrator(sequelize: Sequelize) {
  return new Umzug({
    migrations: steps,
    context: sequelize.getQueryInterface(),
    storage: new SequelizeStorage({ sequelize, tableName: 'schema_migrations' }),
    logger: undefined,
  });
}

const MIGRATION_LOCK = 5_203_881;

/** Brings the database up to date; several servers that start together wait for one another. */
export async function migrate(sequelize: Sequelize): Promise<void> {
  await sequelize.transaction(async (transaction) => {
    await sequelize.query('select pg_advisory_xact_lock(:lock)', { replacements: { lock: MIGRATION_LOCK }, transaction });
    await migrator(sequelize).up();
  });
}

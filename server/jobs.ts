import PgBoss from 'pg-boss';
import { Op } from 'sequelize';
import type { Context } from './context';

const HOUSEKEEPING = 'housekeeping';

/** The queue, running. */
export interface Jobs {
  stop: () => Promise<void>;
}

/** Drops sessions that have expired or ended: their tokens are refused anyway. */
export async function dropOldSessions({ db, now }: Context): Promise<void> {
  await db.sessions.destroy({ where: { [Op.or]: [{ expiresAt: { [Op.lt]: now() } }, { endedAt: { [Op.not]: null } }] } });
}

/** Starts the queue inside PostgreSQL and the work that comes round by itself. */
export async function startJobs(context: Context): Promise<Jobs> {
  const boss = new PgBoss({ connectionString: context.config.databaseUrl, schema: 'jobs', max: 3 });
  // Without a listener an error event would end the process; the error itself holds the connection's settings.
  boss.on('error', (error) => context.log.error({ message: error.message }, 'queue'));
  await boss.start();
  await boss.createQueue(HOUSEKEEPING);
  await boss.schedule(HOUSEKEEPING, '17 3 * * *');
  await boss.work(HOUSEKEEPING, { pollingIntervalSeconds: 60 }, () => dropOldSessions(context));
  return { stop: () => boss.stop({ graceful: true, timeout: 5000 }) };
}

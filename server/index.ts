import type { Server } from 'node:http';
import { pino } from 'pino';
import { createApp } from './app';
import { readConfig } from './config';
import type { Context } from './context';
import { startJobs, type Jobs } from './jobs';
import { migrate } from './migrations';
import { openDatabase } from './models/database';
import { loadStartingPoints } from './resources/starting-points/service';
import { SheetPress } from './sheets/press';

/** The first sheet should not wait for a browser to start, and the start not for the browser. */
const WARM_UP_AFTER = 3000;
/** How long requests under way may take when the server is asked to end. */
const PATIENCE = 5000;

function listen(context: Context): Promise<Server> {
  const { config } = context;
  return new Promise((resolve, reject) => {
    const server = createApp(context).listen(config.port, config.host, (error?: Error) => (error ? reject(error) : resolve(server)));
  });
}

function addressOf(server: Server, host: string): string {
  const address = server.address();
  const port = typeof address === 'object' && address ? address.port : '';
  return `http://${host.includes(':') ? `[${host}]` : host}:${port}`;
}

/** Takes no new requests, lets those under way finish, and ends what was started. */
async function close(server: Server, jobs: Jobs, { press, db }: Context): Promise<void> {
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  const impatient = setTimeout(() => server.closeAllConnections(), PATIENCE);
  await closed;
  clearTimeout(impatient);
  await press.close();
  await jobs.stop();
  await db.close();
}

async function serve(): Promise<void> {
  const config = readConfig(process.env);
  const log = pino({ level: config.logLevel });
  const db = openDatabase(config.databaseUrl);
  const press = new SheetPress(config.chromium);
  const context: Context = { config, db, log, press, now: () => new Date() };

  await migrate(db.sequelize);
  await loadStartingPoints(context);
  const server = await listen(context);
  const jobs = await startJobs(context);
  setTimeout(() => press.warmUp().catch((error: Error) => log.warn(error.message)), WARM_UP_AFTER).unref();

  let closing: Promise<void> | null = null;
  for (const signal of ['SIGINT', 'SIGTERM'] as const)
    process.on(signal, () => {
      closing ??= close(server, jobs, context).then(() => process.exit(0), giveUp);
    });
  console.log(`listening on ${addressOf(server, config.host)}`);
}

/** The last words stand in the log of whoever started us: a sentence, not a stack. */
function giveUp(error: unknown): void {
  console.error(error instanceof Error ? error.message : String(error));
  process.exit(1);
}

serve().catch(giveUp);

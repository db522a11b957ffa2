import { pino } from 'pino';
import { createApp } from './app';
import { readConfig } from './config';
import type { Context } from './context';
import { startJobs } from './jobs';
import { migrate } from './migrations';
import { openDatabase } from './models/database';
import { loadStartingPoints } from './resources/starting-points/service';
import { SheetPress } from './sheets/press';

const config = readConfig(process.env);
const log = pino({ level: config.logLevel });
const db = openDatabase(config.databaseUrl);
const press = new SheetPress(config.chromium);
const context: Context = { config, db, log, press, now: () => new Date() };

await migrate(db.sequelize);
await loadStartingPoints(context);
const jobs = await startJobs(context);

const server = createApp(context).listen(config.port, config.host, (error?: Error) => {
  if (error) {
    log.fatal(error);
    process.exit(1);
  }
  const address = server.address();
  const port = typeof address === 'object' && address ? address.port : config.port;
  console.log(`listening on http://${config.host.includes(':') ? `[${config.host}]` : config.host}:${port}`);
});

/** The first sheet should not wait for a browser to start, and the start not for the browser. */
const WARM_UP_AFTER = 3000;
setTimeout(() => press.warmUp().catch((error: Error) => log.warn(error.message)), WARM_UP_AFTER).unref();

const PATIENCE = 5000;
let closing: Promise<void> | null = null;

/** Takes no new requests, lets those under way finish, and ends what was started. */
function close(): Promise<void> {
  closing ??= (async () => {
    const closed = new Promise<void>((resolve) => server.close(() => resolve()));
    server.closeIdleConnections();
    const impatient = setTimeout(() => server.closeAllConnections(), PATIENCE);
    await closed;
    clearTimeout(impatient);
    await press.close();
    await jobs.stop();
    await db.close();
    process.exit(0);
  })();
  return closing;
}
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => void close());

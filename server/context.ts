import type { Logger } from 'pino';
import type { Config } from './config';
import type { Database } from './models/database';

/** What the server's parts are given: settings, database, log and clock. */
export interface Context {
  config: Config;
  db: Database;
  log: Logger;
  now: () => Date;
}

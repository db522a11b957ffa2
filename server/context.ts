import type { Logger } from 'pino';
import type { Config } from './config';
import type { Database } from './models/database';
import type { SheetPress } from './sheets/press';

/** What the server's parts are given: settings, database, log and clock. */
export interface Context {
  config: Config;
  db: Database;
  log: Logger;
  /** Prints sheets with one browser for the whole process. */
  press: SheetPress;
  now: () => Date;
}

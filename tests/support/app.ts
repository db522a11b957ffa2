import type { Express } from 'express';
import { pino } from 'pino';
import { createApp } from '../../server/app';
import { readConfig, type Config } from '../../server/config';
import type { Context } from '../../server/context';
import { openDatabase, type Database } from '../../server/models/database';
import { loadStartingPoints } from '../../server/resources/starting-points/service';
import { SheetPress } from '../../server/sheets/press';
import { freshDatabase } from './database';

/** The app on a database of its own, with a clock that tests may put forward. */
export interface OpenApp {
  app: Express;
  context: Context;
  db: Database;
  /** Puts the clock forward. */
  wait: (milliseconds: number) => void;
  /** The same database behind an app with other settings. */
  withSettings: (settings: Partial<Config>) => Express;
  close: () => Promise<void>;
}

/** Settings under which many requests of one test are no excess, and passwords are cheap to check. */
export async function openApp(settings: Partial<Config> = {}): Promise<OpenApp> {
  const url = await freshDatabase();
  const config: Config = {
    ...readConfig({
      DATABASE_URL: url,
      JWT_SECRET: 'a secret for tests that is long enough',
      LOG_LEVEL: 'silent',
      PASSWORD_COST: '4',
      SIGN_IN_LIMIT: '10000',
      NEW_LIMIT: '10000',
    }),
    ...settings,
  };
  const db = openDatabase(url);
  let ahead = 0;
  const press = new SheetPress(config.chromium);
  const context: Context = { config, db, log: pino({ level: config.logLevel }), press, now: () => new Date(Date.now() + ahead) };
  await loadStartingPoints(context);
  return {
    app: createApp(context),
    context,
    db,
    wait: (milliseconds) => {
      ahead += milliseconds;
    },
    withSettings: (changed) => createApp({ ...context, config: { ...config, ...changed } }),
    close: async () => {
      await press.close();
      await db.close();
    },
  };
}

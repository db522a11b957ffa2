import fs from 'node:fs';
import path from 'node:path';
import { startPostgres } from '../../server/bin/postgres.mjs';
import { openBrowser } from '../support/browser';
import { publishDemo } from '../support/demo';
import { startServer } from '../support/server';
import { openFolder } from '../support/start-command';
import { appTimes } from './app-times';
import { planningTimes } from './planning-times';
import { serverTimes } from './server-times';
import { startTimes } from './start-times';
import { printTable, type Measure } from './table';

/** `npm run bench`: measures on this machine, printed as a table. What each measure means stands in README.md beside this file. */
const measures: Measure[] = [];
const folder = openFolder();
const database = await startPostgres({ dir: path.join(folder, 'postgres') });
try {
  const server = await startServer({ databaseUrl: database.url });
  const browser = await openBrowser();
  try {
    const demo = await publishDemo(server.address);
    measures.push(...(await serverTimes(demo)), ...(await appTimes(browser, server.address, demo)));
    measures.unshift(...planningTimes(demo.file));
  } finally {
    await browser.close();
    await server.stop();
  }
  measures.unshift(...(await startTimes()));
} finally {
  await database.stop();
  fs.rmSync(folder, { recursive: true });
}
printTable(measures);

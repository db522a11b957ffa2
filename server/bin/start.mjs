// `npm start`: everything that is missing is installed, built and started; Ctrl-C stops it all. No dependencies: runs before `npm ci`.
import fs from 'node:fs';
import path from 'node:path';
import { claim } from './claim.mjs';
import { startDatabase } from './database.mjs';
import { endAll } from './processes.mjs';
import { checkDatabase, checkPort, readSettings, startServer, untilServing } from './server.mjs';
import { setUp } from './setup.mjs';
import { say, step, tellTrouble, Trouble } from './words.mjs';

process.chdir(path.resolve(import.meta.dirname, '../..'));

const cleanUp = [];
let ending = null;

/** Stops what was started, the last first. Asked twice, it goes on with the first. */
function finish(code) {
  ending ??= (async () => {
    await endAll();
    for (const undo of cleanUp.reverse()) await undo();
    process.exit(code);
  })();
  return ending;
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
  process.on(signal, () => {
    if (!ending) say('\nStopping …');
    void finish(0);
  });

/** Takes the data folder for this process alone. */
function takeDataFolder({ dataFolder, host, port }) {
  try {
    fs.mkdirSync(dataFolder, { recursive: true });
    fs.accessSync(dataFolder, fs.constants.W_OK | fs.constants.X_OK);
  } catch (error) {
    throw new Trouble(
      `The data folder ${dataFolder} cannot be written (${error.code}).`,
      'Give it to this user (chown), or choose another: REDPOLL_DATA=~/redpoll npm start',
    );
  }
  const taken = claim(path.join(dataFolder, 'running.json'), { address: `http://${host}:${port}` });
  if (taken.release) return taken.release;
  throw new Trouble(
    `Redpoll is already running on this data folder: ${taken.holder.address} (process ${taken.holder.pid}).`,
    'Open that address; or end it first (Ctrl-C where it runs); or start a second one with REDPOLL_DATA and PORT of its own.',
  );
}

async function serve() {
  const dev = process.argv.includes('--dev');
  const settings = readSettings();
  say('Redpoll is getting ready.');
  cleanUp.push(takeDataFolder(settings));
  await checkPort(settings);
  if (settings.databaseUrl) await checkDatabase(settings.databaseUrl);
  await setUp({ database: !settings.databaseUrl, tests: false, built: !dev });

  let { databaseUrl } = settings;
  if (!databaseUrl) {
    const database = await step('Starting the database', () => startDatabase(settings.dataFolder));
    cleanUp.push(() => database.stop());
    database.child?.once('exit', () => unexpected('The database'));
    databaseUrl = database.url;
  }
  if (dev) {
    const { serveForDevelopers } = await import('./develop.mjs');
    return serveForDevelopers({ ...settings, databaseUrl, cleanUp });
  }
  const server = startServer({ ...settings, databaseUrl });
  const address = await step('Starting the server', () => untilServing(server, settings));
  server.once('exit', () => unexpected('The server'));
  say(`\nRedpoll is at ${address}\nIt runs until you press Ctrl-C here. Your data: ${settings.dataFolder}`);
}

function unexpected(what) {
  if (ending) return;
  console.error(`\n${what} ended unexpectedly.\n→ Start again: npm start. What was saved is kept; the logs are in the data folder.`);
  void finish(1);
}

try {
  await serve();
} catch (error) {
  if (!ending) tellTrouble(error);
  await finish(1);
}

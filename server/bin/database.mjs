// Where the private database lives. No dependencies: runs before `npm ci`.
import crypto from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { reachable, startPostgres } from './postgres.mjs';
import { say } from './words.mjs';

const SYSTEM_FOLDER = '/var/lib/redpoll';

/**
 * The cluster's folder: inside the data folder. As root below a closed folder (such as /root) PostgreSQL's user cannot get there;
 * it then lives in a folder of the system, and a note in the data folder remembers which one.
 */
function clusterFolder(dataFolder) {
  const note = path.join(dataFolder, 'database-folder');
  if (fs.existsSync(note)) return fs.readFileSync(note, 'utf8').trim();
  const inside = path.join(dataFolder, 'postgres');
  if (reachable(inside) || process.env.REDPOLL_DATA) return inside;
  fs.rmdirSync(inside);
  const outside = path.join(SYSTEM_FOLDER, crypto.randomBytes(6).toString('hex'));
  fs.mkdirSync(outside, { recursive: true });
  fs.writeFileSync(note, `${outside}\n`);
  say(`  PostgreSQL's user cannot reach ${inside}, so the database lives in ${outside}.`);
  return outside;
}

/** @param {string} dataFolder */
export const startDatabase = (dataFolder) => startPostgres({ dir: clusterFolder(dataFolder) });

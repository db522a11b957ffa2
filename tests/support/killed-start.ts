import { randomUUID } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { expect } from 'vitest';
import type { Snapshot } from '../../shared/contracts/api';
import type { ChangesResponse } from '../../shared/contracts/changes';
import { Client } from './client';
import { freePort, openFolder, processesNaming, startCommand } from './start-command';

/** The process ids of the start command's database, from the file that it leaves in its folder. */
const databasePid = (folder: string) => Number(fs.readFileSync(path.join(folder, 'postgres/data/postmaster.pid'), 'utf8').split('\n')[0]);

/**
 * Starts everything as a person does, saves, and kills the start command and its database with -9 at the same moment; each next start
 * must come up by itself and hold everything that was called saved.
 */
export async function surviveFullKills(rounds: number): Promise<void> {
  const folder = openFolder();
  const port = await freePort();
  const settings = { REDPOLL_DATA: folder, PORT: String(port), DATABASE_URL: '' };
  const client = new Client(`http://127.0.0.1:${port}`);
  let production: string | null = null;
  let saved: string | null = null;
  try {
    for (let round = 0; round <= rounds; round++) {
      const one = startCommand(settings);
      await one.says('Redpoll is at');
      production ??= await client.openTrial();
      const snapshot: Snapshot = await client.json('GET', `/api/productions/${production}`);
      const song = snapshot.rows.find((row) => row.resource === 'songs');
      if (saved !== null) expect(song?.fields.title).toBe(saved);
      const title = `After start ${round}`;
      const change = { id: randomUUID(), resource: 'songs', key: song?.key, op: 'update', fields: { title } };
      await client.json<ChangesResponse>('POST', `/api/productions/${production}/changes`, { changes: [change] });
      saved = title;
      process.kill(databasePid(folder), 'SIGKILL');
      one.process.kill('SIGKILL');
      await one.ended;
    }
    for (let tries = 0; tries < 400 && processesNaming(folder).length > 0; tries++) await new Promise((resolve) => setTimeout(resolve, 50));
    expect(processesNaming(folder)).toEqual([]);
  } finally {
    fs.rmSync(folder, { recursive: true, force: true });
  }
}

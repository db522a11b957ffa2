import { randomBytes, randomUUID } from 'node:crypto';
import { expect } from 'vitest';
import type { Change } from '../../shared/contracts/changes';
import type { HistoryEntry, Snapshot } from '../../shared/contracts/api';
import { Random } from '../../shared/solver/search/random';
import { Client } from './client';
import { startServer } from './server';
import { freePort } from './start-command';

interface Attempt {
  change: Change;
  count: number;
}

/** One writer: counts up in the notes of its song until the server is gone; keeps what was called saved and what was not answered. */
class Writer {
  saved = 0;
  open: Attempt | null = null;
  readonly song: string;
  readonly #client: Client;
  readonly #changes: string;
  #count = 0;

  constructor(client: Client, production: string, song: string) {
    this.#client = client;
    this.#changes = `/api/productions/${production}/changes`;
    this.song = song;
  }

  async post(attempt: Attempt): Promise<boolean> {
    const answer = await this.#client.send('POST', this.#changes, { changes: [attempt.change] }).catch(() => null); // the server was killed
    if (!answer) return false;
    expect(answer.status).toBe(200);
    await answer.json().catch(() => null); // killed in mid-answer: the status was already "saved"
    this.saved = attempt.count;
    this.open = null;
    return true;
  }

  async writeUntilGone(): Promise<void> {
    for (;;) {
      const count = ++this.#count;
      const fields = { title: `Round ${count}` };
      this.open = { count, change: { id: randomUUID(), resource: 'songs', key: this.song, op: 'update', fields } };
      if (!(await this.post(this.open))) return;
    }
  }
}

const savedBy = (writers: Writer[]) => writers.reduce((sum, { saved }) => sum + saved, 0);
const pause = (milliseconds: number) => new Promise((resolve) => setTimeout(resolve, milliseconds));
const numberIn = (title: unknown) => Number(/^Round (\d+)$/.exec(String(title))?.[1] ?? 0);

/**
 * Kills the server with -9 again and again while four people write, and looks each time whether what was called saved is there,
 * in the rows and once in the history, and whether an unanswered change that is sent again is applied exactly once.
 */
export async function surviveKills(databaseUrl: string, rounds: number, seed: number): Promise<void> {
  const random = new Random(seed);
  const secret = randomBytes(32).toString('hex');
  const port = await freePort();
  let server = await startServer({ databaseUrl, port, secret });
  try {
    const client = new Client(server.address);
    const id = await client.openTrial();
    const read = () => client.json<Snapshot>('GET', `/api/productions/${id}`);
    const songs = (await read()).rows.filter((row) => row.resource === 'songs').slice(0, 4);
    const writers = songs.map((song) => new Writer(client, id, song.key));
    expect(writers.length).toBeGreaterThan(1);

    for (let round = 0; round < rounds; round++) {
      const goal = savedBy(writers) + 4 + random.below(40);
      const writing = Promise.all(writers.map((writer) => writer.writeUntilGone()));
      while (savedBy(writers) < goal) await pause(1);
      await pause(random.below(10));
      await server.kill();
      await writing;
      server = await startServer({ databaseUrl, port, secret });

      const rows = new Map((await read()).rows.filter((row) => row.resource === 'songs').map((row) => [row.key, row]));
      for (const writer of writers) {
        const stored = numberIn(rows.get(writer.song)?.fields.title);
        expect([writer.saved, writer.open?.count]).toContain(stored);
        if (writer.open) expect(await writer.post(writer.open)).toBe(true);
        const history = await client.json<HistoryEntry[]>('GET', `/api/productions/${id}/history?resource=songs&key=${writer.song}`);
        const written = history.map((entry) => numberIn(entry.after?.title)).filter((count) => count > 0);
        expect([...written].sort((a, b) => a - b)).toEqual(Array.from({ length: writer.saved }, (_, index) => index + 1));
      }
    }
  } finally {
    await server.stop();
  }
}

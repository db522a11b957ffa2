import fs from 'node:fs';
import net from 'node:net';
import path from 'node:path';
import { afterEach, beforeEach, expect, inject, it } from 'vitest';
import { freshDatabase } from '../support/database';
import { freePort, openFolder, processesNaming, startCommand, type Started } from '../support/start-command';

let folder: string;
let port: number;
let started: Started[];

beforeEach(async () => {
  folder = openFolder();
  port = await freePort();
  started = [];
});
afterEach(async () => {
  for (const one of started) {
    one.process.kill('SIGTERM');
    await one.ended;
  }
  await gone(folder);
  fs.rmSync(folder, { recursive: true });
});

const start = (env: Record<string, string> = {}) => {
  const one = startCommand({ REDPOLL_DATA: folder, PORT: String(port), DATABASE_URL: '', ...env });
  started.push(one);
  return one;
};
const serving = (one: Started) => one.says(`Redpoll is at http://127.0.0.1:${port}`);
const health = () => fetch(`http://127.0.0.1:${port}/api/health`).then((answer) => answer.status);

/** Waits until no process of the data folder is left (the kernel ends them in their own time after kill -9). */
async function gone(name: string) {
  for (let tries = 0; tries < 200 && processesNaming(name).length > 0; tries++) await new Promise((resolve) => setTimeout(resolve, 50));
  expect(processesNaming(name)).toEqual([]);
}

it('serves, and leaves no process behind when it is asked to end', async () => {
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) {
    const one = start();
    await serving(one);
    expect(await health()).toBe(200);
    expect(fs.statSync(path.join(folder, 'jwt-secret')).mode & 0o777).toBe(0o600);
    one.process.kill(signal);
    expect(await one.ended).toBe(0);
    expect(processesNaming(folder)).toEqual([]);
    await expect(health()).rejects.toThrow();
  }
});

it('starts again after it was killed with -9, at once and with a stale pid file that names a living process', async () => {
  const first = start();
  await serving(first);
  first.process.kill('SIGKILL');
  await first.ended;
  const second = start();
  await serving(second);
  expect(await health()).toBe(200);

  const pidFile = path.join(folder, 'postgres/data/postmaster.pid');
  const kept = fs.readFileSync(pidFile, 'utf8');
  second.process.kill('SIGKILL');
  await second.ended;
  await gone(folder);
  fs.writeFileSync(pidFile, kept.replace(/^\d+/, String(process.pid)));
  const third = start();
  await serving(third);
  expect(await health()).toBe(200);
});

it('says where it already runs when it is started a second time, and the first goes on', async () => {
  const first = start();
  await serving(first);
  const second = start({ PORT: String(await freePort()) });
  expect(await second.ended).toBe(1);
  expect(second.words()).toContain(`Redpoll is already running on this data folder: http://127.0.0.1:${port}`);
  expect(await health()).toBe(200);
});

it('names a taken port and one that is free', async () => {
  const other = net.createServer().listen(port, '127.0.0.1');
  const one = start();
  expect(await one.ended).toBe(1);
  expect(one.words()).toContain(`Port ${port} is taken`);
  const offered = Number(/PORT=(\d+) npm start/.exec(one.words())?.[1]);
  await new Promise<void>((resolve, reject) => {
    const probe = net.createServer().once('error', reject);
    probe.listen(offered, '127.0.0.1', () => probe.close(() => resolve()));
  });
  other.close();
});

it('refuses a port that is none, and an address of a database that does not answer, with a next step', async () => {
  const wrong = start({ PORT: 'seventy' });
  expect(await wrong.ended).toBe(1);
  expect(wrong.words()).toContain('PORT is "seventy", which is no port');
  const nowhere = start({ DATABASE_URL: `postgres://nobody:x@127.0.0.1:${await freePort()}/none` });
  expect(await nowhere.ended).toBe(1);
  expect(nowhere.words()).toContain('does not answer (ECONNREFUSED)');
  for (const one of [wrong, nowhere]) expect(one.words()).not.toMatch(/^\s+at /m);
});

it('refuses a data folder that cannot be made, with a next step', async () => {
  fs.writeFileSync(path.join(folder, 'file'), '');
  const one = start({ REDPOLL_DATA: path.join(folder, 'file/below') });
  expect(await one.ended).toBe(1);
  expect(one.words()).toMatch(/The data folder .* cannot be written \(ENOTDIR\)/);
});

it('uses the database it is given and makes none of its own', async () => {
  const one = start({ DATABASE_URL: await freshDatabase() });
  await serving(one);
  expect(await health()).toBe(200);
  expect(fs.existsSync(path.join(folder, 'postgres'))).toBe(false);
  expect(one.words()).not.toContain(new URL(inject('pgUrl')).password);
});

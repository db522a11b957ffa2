import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import type { Browser } from 'puppeteer-core';
import { startPostgres } from '../../server/bin/postgres.mjs';
import { openBrowser, signIn, visit, type Theme } from '../support/browser';
import { publishDemo, type PublishedDemo } from '../support/demo';
import { startServer } from '../support/server';
import { openFolder } from '../support/start-command';

/**
 * `npm run pictures`: the pictures of README.md, from the running app with the demo, planned with a fixed seed.
 * `npm run pictures -- FOLDER` takes every page in both themes and the run sheet into a folder, to look at.
 */
interface Shot {
  name: string;
  path: string;
  theme: Theme;
}

const README_SHOTS: Shot[] = [
  { name: 'plan-paper', path: '/p/:id/plan', theme: 'paper' },
  { name: 'plan-dim', path: '/p/:id/plan', theme: 'dim' },
  { name: 'songs-paper', path: '/p/:id/songs', theme: 'paper' },
];

const EVERY_PAGE: Shot[] = [
  '/',
  '/account',
  ...['production', 'songs', 'people', 'rooms', 'plan', 'sheets'].map((section) => `/p/:id/${section}`),
].flatMap((address) =>
  (['paper', 'dim'] as const).map((theme) => ({ name: `${address.split('/').at(-1) || 'start'}-${theme}`, path: address, theme })),
);

async function shoot(browser: Browser, address: string, demo: PublishedDemo, shot: Shot, folder: string): Promise<void> {
  const { page } = await visit(browser);
  await page.evaluateOnNewDocument((theme) => localStorage.setItem('redpoll.theme', theme), shot.theme);
  await signIn(page, address, demo.client.cookie);
  await page.goto(address + shot.path.replace(':id', demo.id), { waitUntil: 'networkidle0' });
  await page.waitForSelector('h1');
  await page.screenshot({ path: path.join(folder, `${shot.name}.png`) as `${string}.png` });
  await page.browserContext().close();
}

/** The first page of the first day's run sheet, as it prints. */
async function shootRunSheet({ client, id, plan }: PublishedDemo, folder: string): Promise<void> {
  const first = plan.items.find((item) => item.kind === 'pass');
  if (!first?.room) throw new Error('The plan has no pass.');
  const query = new URLSearchParams({ version: '1', date: first.start.slice(0, 10), room: first.room, paper: 'A4' });
  const answer = await client.send('GET', `/api/productions/${id}/sheets/run-sheet.pdf?${query}`);
  if (!answer.ok) throw new Error(`no run sheet: ${answer.status} ${await answer.text()}`);
  const input = new Uint8Array(await answer.arrayBuffer());
  execFileSync('pdftoppm', ['-png', '-r', '80', '-f', '1', '-l', '1', '-singlefile', '-', path.join(folder, 'run-sheet')], { input });
}

const asked = process.argv[2];
const folder = asked ?? path.join(import.meta.dirname, 'shots');
fs.mkdirSync(folder, { recursive: true });
const data = openFolder();
const database = await startPostgres({ dir: path.join(data, 'postgres'), throwaway: true });
try {
  const server = await startServer({ databaseUrl: database.url });
  const browser = await openBrowser();
  try {
    const demo = await publishDemo(server.address, { iterations: 40_000 });
    for (const shot of asked ? EVERY_PAGE : README_SHOTS) await shoot(browser, server.address, demo, shot, folder);
    await shootRunSheet(demo, folder);
  } finally {
    await browser.close();
    await server.stop();
  }
} finally {
  await database.stop();
  fs.rmSync(data, { recursive: true });
}
console.log(`The pictures are in ${folder}.`);

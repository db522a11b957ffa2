import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import type { Browser, Page } from 'puppeteer-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { PublishedPlan, Snapshot } from '../../shared/contracts/api';
import type { PlanItem } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { fileOf } from '../../shared/domain/changes';
import { checkPlan } from '../../shared/solver/check/check';
import { focused, openBrowser, press, seeText, tabTo, visit } from '../support/browser';
import { freshDatabase } from '../support/database';
import { textOfPdf } from '../support/pdf';
import { startServer, type RunningServer } from '../support/server';

let server: RunningServer;
let browser: Browser;
let downloads: string;

beforeAll(async () => {
  server = await startServer({ databaseUrl: await freshDatabase() });
  browser = await openBrowser();
  downloads = fs.mkdtempSync(path.join(os.tmpdir(), 'redpoll-downloads-'));
});
afterAll(async () => {
  await browser?.close();
  await server?.stop();
  fs.rmSync(downloads, { recursive: true });
});

/** Reads what the server holds, with the session of the page. */
const ask = <T>(page: Page, address: string) =>
  page.evaluate((from) => fetch(from).then((answer) => answer.json() as unknown), address) as Promise<T>;

const productionOf = (page: Page) => /\/p\/([^/]+)/.exec(page.url())?.[1] ?? '';

async function productionFile(page: Page): Promise<ProductionFile> {
  return fileOf((await ask<Snapshot>(page, `/api/productions/${productionOf(page)}`)).rows);
}

/** Waits for the one file that a download brings. */
async function downloaded(): Promise<Uint8Array> {
  for (let tries = 0; tries < 300; tries++) {
    const name = fs.readdirSync(downloads).find((file) => file.endsWith('.pdf'));
    if (name) return fs.readFileSync(path.join(downloads, name));
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error('no PDF was downloaded');
}

const modeOf = (file: ProductionFile, part: string) => file.songs[0]?.parts?.find(({ id }) => id === part)?.mode;

/** Follows a link of the sections. */
async function go(page: Page, section: string) {
  await tabTo(page, section);
  await press(page, 'Enter');
  await page.waitForFunction((title) => document.querySelector('h1')?.textContent?.includes(title), {}, section);
}

const planned = (page: Page) => page.waitForSelector('[role=progressbar]', { hidden: true, timeout: 60_000 });

/** Tabs into the ledger and goes along the first song to the cell of that name. */
async function moveToCell(page: Page, name: RegExp) {
  const passed: string[] = [];
  for (let stop = await tabTo(page, /./); !/cell|header/i.test(stop.role);) stop = await tabTo(page, /./);
  await press(page, 'Control+Home');
  for (let count = 0; count < 20; count++) {
    const here = await focused(page);
    if (here && name.test(here.name)) return;
    passed.push(`${here?.role} “${here?.name}”`);
    await press(page, 'ArrowRight');
  }
  throw new Error(`No cell is called ${name}: ${passed.join(', ')}`);
}

const onFirstDay = (items: PlanItem[]) => {
  const day = items.find((item) => item.kind === 'pass')?.start.slice(0, 10);
  return items.filter((item) => item.kind === 'pass' && item.start.slice(0, 10) === day);
};

it('goes from the demo to a printed run sheet by keyboard alone', async () => {
  const { page, complaints } = await visit(browser);
  const session = await page.createCDPSession();
  await session.send('Browser.setDownloadBehavior', {
    behavior: 'allow',
    downloadPath: downloads,
    browserContextId: page.browserContext().id,
  });

  await page.goto(server.address, { waitUntil: 'networkidle0' });
  await seeText(page, 'the demo');
  await tabTo(page, 'Open the demo');
  await press(page, 'Enter');

  // The demo opens on its plan and looks for one at once.
  await page.waitForSelector('[role=progressbar]');
  await planned(page);

  // A cell of the ledger is typed over, and saved.
  await go(page, 'Songs');
  await page.waitForSelector('[role=grid]');
  const before = await productionFile(page);
  const part = before.songs[0]!.parts!.find(({ mode }) => mode === 'overdub')!;
  await moveToCell(page, new RegExp(part.id, 'i'));
  await press(page, 'd');
  await expect.poll(async () => modeOf(await productionFile(page), part.id), { timeout: 15_000, interval: 200 }).toBe('double');

  await go(page, 'Plan');
  await tabTo(page, /^Plan/);
  await press(page, 'Control+Enter');
  await page.waitForSelector('[role=progressbar]');
  await planned(page);
  await tabTo(page, 'Publish…');
  await press(page, 'Enter');
  await page.waitForSelector('[role=dialog]');
  await tabTo(page, 'Publish version 1');
  await press(page, 'Enter');
  await seeText(page, 'Version 1 is published.');

  const id = productionOf(page);
  const { outcome } = await ask<PublishedPlan>(page, `/api/productions/${id}/versions/1`);
  if (outcome.cost === null) throw new Error(`published without a plan: ${outcome.status}`);
  const file = await productionFile(page);
  expect(checkPlan(file, outcome).violations).toEqual([]);

  await tabTo(page, 'Sheets and calendars');
  await press(page, 'Enter');
  await page.waitForFunction(() => document.querySelector('h1')?.textContent?.includes('Sheets'));
  await tabTo(page, /PDF/);
  await press(page, 'Enter');
  const text = textOfPdf(await downloaded()).replace(/\s+/g, ' ');

  const passes = onFirstDay(outcome.items);
  expect(passes.length).toBeGreaterThan(1);
  const people = new Map(file.people.map((person) => [person.id, person.short ?? person.name ?? person.id]));
  const songs = new Map((file.passes ?? []).map((pass) => [pass.id, file.songs.find((song) => song.id === pass.song)?.code]));
  for (const pass of passes) {
    expect(text).toContain(pass.start.slice(11, 16));
    expect(text).toContain(songs.get(pass.id ?? '') ?? pass.id);
    for (const person of pass.people) expect(text).toContain(people.get(person));
  }
  expect(text).toContain('Version 1');
  expect(complaints).toEqual([]);
});

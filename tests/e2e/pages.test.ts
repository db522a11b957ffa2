import type { Browser, Page } from 'puppeteer-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { findingsOfAxe, openBrowser, sidewaysScroll, signIn, visit, walkByTab, type Theme, type Visit } from '../support/browser';
import { freshDatabase } from '../support/database';
import { publishDemo } from '../support/demo';
import { startServer, type RunningServer } from '../support/server';

const PAGES = [
  '/',
  '/account',
  '/invitation/no-such-token',
  '/p/:id/production',
  '/p/:id/songs',
  '/p/:id/people',
  '/p/:id/rooms',
  '/p/:id/plan',
  '/p/:id/sheets',
  '/no-such-page',
];
const THEMES: Theme[] = ['paper', 'dim'];

let server: RunningServer;
let browser: Browser;
let id: string;
let visits: Record<Theme, Visit>;

async function signedInVisit(theme: Theme, cookie: string): Promise<Visit> {
  const one = await visit(browser);
  await one.page.evaluateOnNewDocument((name) => localStorage.setItem('redpoll.theme', name), theme);
  await signIn(one.page, server.address, cookie);
  return one;
}

beforeAll(async () => {
  server = await startServer({ databaseUrl: await freshDatabase() });
  browser = await openBrowser();
  const demo = await publishDemo(server.address);
  id = demo.id;
  visits = { paper: await signedInVisit('paper', demo.client.cookie), dim: await signedInVisit('dim', demo.client.cookie) };
});
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

async function open(page: Page, path: string) {
  await page.goto(server.address + path.replace(':id', id), { waitUntil: 'networkidle0' });
  await page.waitForSelector('h1');
}

describe.each(THEMES)('in the theme %s', (theme) => {
  it.each(PAGES)('%s has nothing that axe-core finds, no sideways scroll and no error', async (path) => {
    const { page, complaints } = visits[theme];
    complaints.length = 0;
    await open(page, path);
    expect(await page.evaluate(() => document.documentElement.dataset.theme)).toBe(theme);
    expect(await findingsOfAxe(page)).toEqual([]);
    expect(await sidewaysScroll(page)).toBe(0);
    expect(complaints).toEqual([]);
  });

  it.each(PAGES)('%s gives every control a name and a focus that can be seen', async (path) => {
    const { page } = visits[theme];
    await open(page, path);
    const stops = await walkByTab(page);
    expect(stops.length).toBeGreaterThan(3);
    expect(stops.filter((stop) => stop.name === '' || !stop.visible)).toEqual([]);
  });
});

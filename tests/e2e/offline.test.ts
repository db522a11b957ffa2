import type { Browser } from 'puppeteer-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { openBrowser, signIn, visit } from '../support/browser';
import { Client } from '../support/client';
import { freshDatabase } from '../support/database';
import { startServer, type RunningServer } from '../support/server';

let server: RunningServer;
let browser: Browser;

beforeAll(async () => {
  server = await startServer({ databaseUrl: await freshDatabase() });
  browser = await openBrowser();
});
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

it('opens with the server gone, says so in words, and leaves the addresses of the server alone', async () => {
  const client = new Client(server.address);
  const id = await client.openTrial();
  const { page } = await visit(browser);
  await signIn(page, server.address, client.cookie);
  await page.goto(server.address, { waitUntil: 'networkidle0' });
  await page.evaluate(async () => {
    const { active } = await navigator.serviceWorker.ready;
    while (active?.state !== 'activated') await new Promise((resolve) => setTimeout(resolve, 20));
  });
  await server.stop();

  for (const path of ['/', `/p/${id}/songs`]) {
    await page.goto(server.address + path, { waitUntil: 'load' });
    await page.waitForSelector('nav[aria-label="Sections"]');
    await page.waitForFunction(() => /server|network|offline/i.test(document.querySelector('main')?.innerText ?? ''));
  }
  expect(await page.evaluate(() => document.fonts.ready.then(() => document.fonts.check('16px "Atkinson Hyperlegible"')))).toBe(true);
  for (const path of ['/api/health', '/calendar/none.ics'])
    expect(
      await page.evaluate(
        (address) =>
          fetch(address).then(
            () => 'answered',
            () => 'gone',
          ),
        path,
      ),
    ).toBe('gone');
});

import type { Browser, Page } from 'puppeteer-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Draft } from '../../shared/contracts/api';
import { checkPlan } from '../../shared/solver/check/check';
import { findingsOfAxe, focused, openBrowser, press, seeText, signIn, tabTo, visit } from '../support/browser';
import { Client } from '../support/client';
import { freshDatabase } from '../support/database';
import { exported } from '../support/demo';
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

const planned = (page: Page) => page.waitForSelector('[role=progressbar]', { hidden: true, timeout: 60_000 });
const nameHere = async (page: Page) => (await focused(page))?.name ?? '';
/** `12:30 to 13:45` of the pass that has the focus. */
const timesHere = async (page: Page) => /\d\d:\d\d to \d\d:\d\d/.exec(await nameHere(page))?.[0];
const passHere = (page: Page) =>
  page.evaluate(() => (document.activeElement instanceof HTMLElement ? document.activeElement.dataset.pass : undefined));

async function toPlan(page: Page) {
  for (let stop = await tabTo(page, /./); stop.role !== 'option';) stop = await tabTo(page, /./);
}

it('walks, explains, pins and leaves out passes by keys, and the server holds a plan that keeps it all', async () => {
  const client = new Client(server.address);
  const id = await client.openTrial('quillgate');
  const { page, complaints } = await visit(browser);
  await signIn(page, server.address, client.cookie);
  await page.goto(`${server.address}/p/${id}/plan`);

  // Somebody who opens it for the first time sees a plan without asking for one.
  await page.waitForSelector('[data-pass]', { timeout: 30_000 });
  await planned(page);

  await toPlan(page);
  const first = await nameHere(page);
  await press(page, 'ArrowDown');
  const second = await nameHere(page);
  expect(second).not.toBe(first);
  await press(page, 'ArrowUp');
  expect(await nameHere(page)).toBe(first);
  await press(page, 'ArrowRight');
  expect(await nameHere(page)).not.toBe(first);
  await press(page, 'ArrowLeft', 'Home');
  expect(await nameHere(page)).toBe(first);

  await press(page, 'w');
  await seeText(page, 'Why it is here');
  expect(await nameHere(page)).toBe(first);
  await press(page, 'Enter');
  expect((await focused(page))?.role).toBe('heading');
  expect(await findingsOfAxe(page)).toEqual([]);
  await press(page, 'Escape');
  expect(await nameHere(page)).toBe(first);

  // What is pinned never moves.
  const pinned = await passHere(page);
  const times = await timesHere(page);
  await press(page, 'p');
  await expect
    .poll(async () => (await exported(client, id)).passes?.find((pass) => pass.id === pinned)?.pin?.at?.slice(11))
    .toBe(times?.slice(0, 5));
  expect(await nameHere(page)).toMatch(/; pinned$/);
  await press(page, 'Control+Enter');
  await page.waitForSelector('[role=progressbar]');
  await planned(page);
  expect(await passHere(page)).toBe(pinned);
  expect(await timesHere(page)).toBe(times);

  // A search that is stopped leaves the best plan it had, at once.
  await press(page, 'Control+Enter');
  await tabTo(page, 'Stop and keep this plan');
  await press(page, 'Enter');
  await page.waitForSelector('[role=progressbar]', { hidden: true, timeout: 1_000 });
  await toPlan(page);

  // The last pass of the last day has nothing after it that would need it.
  for (let before = ''; before !== (await nameHere(page));) {
    before = await nameHere(page);
    await press(page, 'ArrowRight');
  }
  await press(page, 'End');
  const leaving = await passHere(page);
  await press(page, 'x');
  await seeText(page, 'by hand');
  await page.waitForFunction((pass) => !document.querySelector(`[data-pass="${pass}"]`), { timeout: 30_000 }, leaving);
  await planned(page);
  expect((await focused(page))?.role).toBe('option');
  await tabTo(page, /^Take it in again/);
  await press(page, 'Enter');
  await page.waitForSelector(`[data-pass="${leaving}"]`, { timeout: 30_000 });
  await planned(page);

  const newest = async () => {
    const drafts = await client.json<Draft[]>('GET', `/api/productions/${id}/plans`);
    return drafts.reduce((last, one) => (one.createdAt > last.createdAt ? one : last));
  };
  const placed = async () => (await newest()).outcome.items.some((item) => item.id === leaving);
  await expect.poll(placed, { timeout: 15_000, interval: 300 }).toBe(true);
  const { outcome } = await newest();
  if (outcome.cost === null) throw new Error(`kept without a plan: ${outcome.status}`);
  expect(checkPlan(await exported(client, id), outcome).violations).toEqual([]);
  expect(complaints).toEqual([]);
});

import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import ICAL from 'ical.js';
import type { Browser, Page } from 'puppeteer-core';
import { Temporal } from 'temporal-polyfill';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { findingsOfAxe, focused, openBrowser, press, seeText, signIn, tabTo, visit, type Theme } from '../support/browser';
import { Client } from '../support/client';
import { freshDatabase } from '../support/database';
import { publishDemo, type PublishedDemo } from '../support/demo';
import { textOfPdf } from '../support/pdf';
import { startServer, type RunningServer } from '../support/server';

let server: RunningServer;
let browser: Browser;
let demo: PublishedDemo;
let downloads: string;

beforeAll(async () => {
  server = await startServer({ databaseUrl: await freshDatabase() });
  browser = await openBrowser();
  demo = await publishDemo(server.address);
  downloads = fs.mkdtempSync(path.join(os.tmpdir(), 'redpoll-sheets-'));
});
afterAll(async () => {
  await browser?.close();
  await server?.stop();
  fs.rmSync(downloads, { recursive: true });
});

async function openSheets(id: string, cookie: string, theme: Theme = 'paper'): Promise<{ page: Page; complaints: string[] }> {
  const one = await visit(browser);
  await one.page.evaluateOnNewDocument((name) => localStorage.setItem('redpoll.theme', name), theme);
  await signIn(one.page, server.address, cookie);
  await one.page.goto(`${server.address}/p/${id}/sheets`, { waitUntil: 'networkidle0' });
  return one;
}

/** The words that can be seen in the preview, but for those of the drawing, which a PDF reader takes apart where they are turned. */
async function previewed(page: Page): Promise<string> {
  const frame = await (await page.waitForSelector('iframe'))!.contentFrame();
  await frame.waitForSelector('.page');
  return frame.$eval('body', (body) => {
    const walker = body.ownerDocument.createTreeWalker(body, NodeFilter.SHOW_TEXT);
    const words: string[] = [];
    while (walker.nextNode())
      if (!walker.currentNode.parentElement?.closest('.unseen, svg')) words.push(walker.currentNode.textContent ?? '');
    return words.join(' ').replace(/\s+/g, ' ');
  });
}

async function downloadedAs(name: string): Promise<Uint8Array> {
  const file = path.join(downloads, name);
  for (let tries = 0; tries < 300 && !fs.existsSync(file); tries++) await new Promise((resolve) => setTimeout(resolve, 100));
  return fs.readFileSync(file);
}

describe('the page of sheets', () => {
  it('shows the sheets of the published plan, goes along them by arrows, and downloads what it shows', async () => {
    const { page, complaints } = await openSheets(demo.id, demo.client.cookie);
    const session = await page.createCDPSession();
    await session.send('Browser.setDownloadBehavior', {
      behavior: 'allow',
      downloadPath: downloads,
      browserContextId: page.browserContext().id,
    });
    await seeText(page, 'version 1, as published');
    const dates = [...new Set(demo.plan.items.filter(({ kind }) => kind === 'pass').map(({ start }) => start.slice(0, 10)))].sort();
    await tabTo(page, /^Mon 8 March/);
    await press(page, 'ArrowDown');
    expect((await focused(page))?.name).toMatch(/^Tue 9 March/);
    await press(page, 'Enter');
    expect(await previewed(page)).toContain('Tue 9 March 2027');

    await press(page, 'd');
    const pdf = textOfPdf(await downloadedAs(`SLUICE_V1_${dates[1]}_RUN-SHEET.pdf`));
    const words = (text: string) => text.match(/[\p{L}\p{N}]+(?:[:–][\p{L}\p{N}]+)*/gu) ?? [];
    // The preview and the print hold the same words; only the order in which a PDF is read differs.
    const printed = new Set(words(pdf));
    const shown = words(await previewed(page)).filter((word) => !/^\d\d:\d\d$/.test(word) || printed.has(word));
    expect(shown.length).toBeGreaterThan(100);
    expect(shown.filter((word) => !printed.has(word))).toEqual([]);

    await press(page, 'End');
    await press(page, 'Enter');
    expect(await previewed(page)).toContain('Call sheet');
    expect(complaints).toEqual([]);
  });

  it('changes the paper', async () => {
    const { page } = await openSheets(demo.id, demo.client.cookie);
    await previewed(page);
    const width = () => page.$eval('iframe', (frame) => frame.contentDocument!.querySelector('.page')!.getBoundingClientRect().width);
    expect(await width()).toBeCloseTo((210 / 25.4) * 96, 0);
    await tabTo(page, 'A4');
    await press(page, 'ArrowRight');
    await page.waitForFunction(() => document.querySelector('iframe')?.contentDocument?.querySelector('.paper-letter'));
    expect(await width()).toBeCloseTo((215.9 / 25.4) * 96, 0);
  });

  it('makes a calendar address that any calendar can read, and withdraws it', async () => {
    const { page } = await openSheets(demo.id, demo.client.cookie);
    const drummer = demo.file.people.find(({ plays }) => plays?.some((what) => what.includes('drum')))!;
    await page.locator(`[role=option] ::-p-text(${drummer.name ?? ''})`).click();
    await tabTo(page, 'Make one');
    await press(page, 'Enter');
    await page.waitForSelector('input[readonly]');
    const address = await page.$eval('input[readonly]', (input) => input.value);
    const answer = await fetch(address);
    expect(answer.status).toBe(200);
    const calendar = new ICAL.Component(ICAL.parse(await answer.text()));
    for (const zone of calendar.getAllSubcomponents('vtimezone')) ICAL.TimezoneService.register(zone);
    const read = calendar.getAllSubcomponents('vevent').map((one) => {
      const event = new ICAL.Event(one);
      return [event.startDate, event.endDate].map((time) => time.toJSDate().getTime());
    });
    const instant = (wall: string) => Temporal.PlainDateTime.from(wall).toZonedDateTime(demo.file.production.timezone).epochMilliseconds;
    expect(read).toEqual(
      demo.plan.calls.filter(({ person }) => person === drummer.id).map((call) => [instant(call.arrive), instant(call.release)]),
    );

    await tabTo(page, 'Withdraw');
    await press(page, 'Enter');
    await page.waitForSelector('[role=dialog]');
    await tabTo(page, 'Withdraw it');
    await press(page, 'Enter');
    await seeText(page, 'No calendar address yet.');
    expect((await fetch(address)).status).toBe(404);
  });

  it.each(['paper', 'dim'] as const)(
    'has nothing that axe-core finds in the theme %s, address, keys and preview included',
    async (theme) => {
      const { page, complaints } = await openSheets(demo.id, demo.client.cookie, theme);
      await page.locator('[role=option] ::-p-text(Mara Quill)').click();
      await page.locator('button ::-p-text(Make)').click();
      await page.waitForSelector('input[readonly]');
      await previewed(page);
      expect(await findingsOfAxe(page)).toEqual([]);
      expect(complaints).toEqual([]);
    },
  );

  it('says the next step while nothing is published, and shows a draft as a draft', async () => {
    const client = new Client(server.address);
    const id = await client.openTrial();
    const { page } = await openSheets(id, client.cookie);
    await seeText(page, 'Publish a plan first');
    await tabTo(page, 'Go to the plan');
    await press(page, 'Enter');
    await page.waitForFunction(() => document.querySelector('h1')?.textContent === 'Plan');
    await page.waitForSelector('[role=progressbar]');
    await page.waitForSelector('[role=progressbar]', { hidden: true, timeout: 60_000 });
    await expect
      .poll(async () => (await client.json<unknown[]>('GET', `/api/productions/${id}/plans`)).length, { timeout: 15_000 })
      .toBeGreaterThan(0);
    await page.goto(`${server.address}/p/${id}/sheets`, { waitUntil: 'networkidle0' });
    await seeText(page, 'a draft');
    expect(await previewed(page)).toContain('DRAFT');
  });
});

import type { Browser, Page } from 'puppeteer-core';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Snapshot } from '../../shared/contracts/api';
import type { ProductionFile } from '../../shared/contracts/resources';
import { fileOf } from '../../shared/domain/changes';
import { openBrowser, press, seeText, signIn, tabTo, visit } from '../support/browser';
import { Client } from '../support/client';
import { freshDatabase } from '../support/database';
import { startServer, type RunningServer } from '../support/server';

let server: RunningServer;
let browser: Browser;
let client: Client;
let id: string;
let page: Page;

beforeAll(async () => {
  server = await startServer({ databaseUrl: await freshDatabase() });
  browser = await openBrowser();
});
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});
beforeEach(async () => {
  client = new Client(server.address);
  id = await client.openTrial();
  ({ page } = await visit(browser));
  await signIn(page, server.address, client.cookie);
});

async function open(section: string): Promise<void> {
  await page.goto(`${server.address}/p/${id}/${section}`, { waitUntil: 'networkidle0' });
  await page.waitForSelector('h1');
}

const stored = async (): Promise<ProductionFile> => fileOf((await client.json<Snapshot>('GET', `/api/productions/${id}`)).rows);
const partOf = (file: ProductionFile, song: string, part: string) =>
  file.songs.find((one) => one.id === song)?.parts?.find((one) => one.id === part);
const passOf = (file: ProductionFile, pass: string) => file.passes?.find((one) => one.id === pass);
const saved = () => seeText(page, 'all saved');
const intoLedger = () => tabTo(page, /^Weir Song, Drums/);
/** What a screen reader says of the cell at hand. */
const here = () => page.evaluate(() => document.activeElement?.querySelector('.sr-only')?.textContent ?? '');

describe('the ledger', () => {
  it('writes a part by its letter, with minutes by digits, takes it away and brings it back with all it had', async () => {
    await open('songs');
    await intoLedger();
    await press(page, 'ArrowRight', 'ArrowRight', 'o', '3', '5', 'Enter');
    expect(await here()).toBe('Weir Song, Fiddle: overdub, Finn, 35 minutes');
    await saved();
    const written = await stored();
    expect(partOf(written, 's1', 'fiddle')).toMatchObject({ mode: 'overdub', players: ['finn'] });
    expect(passOf(written, 's1-fiddle')).toMatchObject({
      parts: ['fiddle'],
      people: ['finn'],
      minutes: partOf(written, 's1', 'fiddle')?.minutes,
    });

    await press(page, '-');
    expect(await here()).toBe('Weir Song, Fiddle: not there');
    await saved();
    const without = await stored();
    expect(partOf(without, 's1', 'fiddle')).toBeUndefined();
    expect(passOf(without, 's1-fiddle')).toBeUndefined();

    await press(page, 'd');
    expect(await here()).toBe('Weir Song, Fiddle: double, Finn, 35 minutes');
    await saved();
    await page.reload({ waitUntil: 'networkidle0' });
    await seeText(page, 'Weir Song, Fiddle: double, Finn, 35 minutes');
  });

  it('keeps changes while the network is away, says so, and sends them when it is back', async () => {
    await open('songs');
    await intoLedger();
    await page.setOfflineMode(true);
    await press(page, 'ArrowRight', 'ArrowRight', 'o');
    await seeText(page, '1 change waits for the server');
    expect(await here()).toContain('Weir Song, Fiddle: overdub');
    expect(partOf(await stored(), 's1', 'fiddle')).toBeUndefined();
    await page.setOfflineMode(false);
    await saved();
    expect(partOf(await stored(), 's1', 'fiddle')?.mode).toBe('overdub');
  });

  it('takes back what the server refuses, keeps what was typed, and shows what others did meanwhile', async () => {
    await open('songs');
    await client.json('POST', `/api/productions/${id}/changes`, {
      changes: [
        {
          id: crypto.randomUUID(),
          resource: 'songs',
          key: 'brick-lamp',
          op: 'create',
          fields: { id: 'brick-lamp', title: 'Somebody else’s' },
        },
      ],
    });
    await tabTo(page, 'Add a song');
    await page.keyboard.type('Brick Lamp');
    await press(page, 'Enter');
    await seeText(page, '1 change not taken');
    await seeText(page, 'Somebody else’s');
    expect((await stored()).songs.filter((song) => song.id === 'brick-lamp')).toHaveLength(1);
    await page.evaluate(() =>
      [...document.querySelectorAll('button')].find((button) => button.textContent?.includes('not taken'))?.click(),
    );
    await seeText(page, 'title: Brick Lamp');
  });
});

describe('people and rooms', () => {
  it('reads windows as they are typed, and keeps what it did not understand', async () => {
    await open('people');
    await tabTo(page, 'When they can be there, one window to a line');
    await press(page, 'Control+a');
    await page.keyboard.type('8 Mar 14-18');
    await press(page, 'Enter');
    await page.keyboard.type('some day');
    await press(page, 'Control+Enter');
    await seeText(page, 'not “some day”');
    expect(await page.evaluate(() => (document.activeElement as HTMLTextAreaElement).value)).toBe('8 Mar 14-18\nsome day');
    await press(page, 'Control+a');
    await page.keyboard.type('8-9 Mar 14-18; maybe 10 Mar');
    await press(page, 'Control+Enter');
    await saved();
    expect((await stored()).people[0]?.windows).toEqual([
      { from: '2027-03-08T14:00', to: '2027-03-08T18:00' },
      { from: '2027-03-09T14:00', to: '2027-03-09T18:00' },
      { from: '2027-03-10T00:00', to: '2027-03-11T00:00', sure: false },
    ]);
  });

  it('takes a person out of everything that names them', async () => {
    await open('people');
    await tabTo(page, 'Remove Mara Quill');
    await press(page, 'Enter');
    await tabTo(page, 'Remove it');
    await press(page, 'Enter');
    await page.waitForFunction(() => !document.querySelector('[data-person="mara"]'));
    await saved();
    expect(JSON.stringify(await stored())).not.toContain('"mara"');
  });

  it('sets the hours of a room and a changeover', async () => {
    await open('rooms');
    await tabTo(page, 'Open');
    await press(page, 'Control+a');
    await page.keyboard.type('8-10 Mar 9:30-19');
    await press(page, 'Control+Enter');
    await tabTo(page, /^From Full kit to Kit aside/);
    await press(page, 'Control+a');
    await page.keyboard.type('40');
    await press(page, 'Enter');
    await saved();
    const file = await stored();
    expect(file.rooms[0]?.open.map(({ from, to }) => `${from} ${to.slice(11)}`)).toEqual([
      '2027-03-08T09:30 19:00',
      '2027-03-09T09:30 19:00',
      '2027-03-10T09:30 19:00',
    ]);
    expect(file.changeovers.find(({ from, to }) => from === 'full-kit' && to === 'no-kit')?.minutes).toBe(40);
  });
});

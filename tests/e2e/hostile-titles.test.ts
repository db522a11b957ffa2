import { randomUUID } from 'node:crypto';
import type { Browser } from 'puppeteer-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Snapshot } from '../../shared/contracts/api';
import { openBrowser, signIn, visit } from '../support/browser';
import { freshDatabase } from '../support/database';
import { publishDemo, type PublishedDemo } from '../support/demo';
import { textOfPdf } from '../support/pdf';
import { startServer, type RunningServer } from '../support/server';

const PAYLOADS = [
  '<script>window.executed = 1</script>',
  '<img src=x onerror="window.executed = 1">',
  '</title><svg onload="window.executed = 1">',
];

let server: RunningServer;
let browser: Browser;
let demo: PublishedDemo;

/** Writes the payloads into every title and name that a page or a sheet shows. */
async function poison(address: string): Promise<PublishedDemo> {
  return publishDemo(address, {
    async before(client, id) {
      const { rows } = await client.json<Snapshot>('GET', `/api/productions/${id}`);
      const field = { songs: 'title', people: 'name', rooms: 'name', setups: 'name', gear: 'name', events: 'name', production: 'title' };
      const changes = rows.flatMap((row, index) => {
        const name = Object.entries(field).find(([resource]) => resource === row.resource)?.[1];
        const fields = name && { [name]: `${row.key} ${PAYLOADS[index % PAYLOADS.length]}` };
        return fields ? [{ id: randomUUID(), resource: row.resource, key: row.key, op: 'update', fields }] : [];
      });
      expect(changes.length).toBeGreaterThan(10);
      await client.json('POST', `/api/productions/${id}/changes`, { changes });
    },
  });
}

beforeAll(async () => {
  server = await startServer({ databaseUrl: await freshDatabase() });
  browser = await openBrowser();
  demo = await poison(server.address);
});
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

it('shows HTML in titles and names as text on every page', async () => {
  const { page, complaints } = await visit(browser);
  await signIn(page, server.address, demo.client.cookie);
  for (const path of [
    '/',
    `/p/${demo.id}/songs`,
    `/p/${demo.id}/people`,
    `/p/${demo.id}/rooms`,
    `/p/${demo.id}/plan`,
    `/p/${demo.id}/sheets`,
  ]) {
    await page.goto(server.address + path, { waitUntil: 'networkidle0' });
    const found = await page.evaluate(() => ({
      text: document.body.innerText.includes('window.executed = 1'),
      elements: document.querySelectorAll('img[src="x"], svg[onload], body script:not([src])').length,
      executed: 'executed' in window,
    }));
    expect({ path, ...found }).toEqual({ path, text: true, elements: 0, executed: false });
  }
  expect(complaints).toEqual([]);
});

it('prints HTML in titles and names as text', async () => {
  const pass = demo.plan.items.find((item) => item.kind === 'pass');
  const query = new URLSearchParams({ version: '1', date: pass!.start.slice(0, 10), room: pass!.room!, paper: 'A4' });
  const answer = await demo.client.send('GET', `/api/productions/${demo.id}/sheets/run-sheet.pdf?${query}`);
  expect(answer.status).toBe(200);
  const text = textOfPdf(new Uint8Array(await answer.arrayBuffer())).replace(/\s+/g, ' ');
  expect(text).toContain('window.executed = 1');
  expect(text).toMatch(/<(script|img|\/title)/);
});

import type { Browser } from 'puppeteer-core';
import { signIn, visit } from '../support/browser';
import type { PublishedDemo } from '../support/demo';
import { kilobytes, median, seconds, timed, type Measure } from './table';

/** Bytes over the wire (the server compresses) until the page is quiet, by kind of file. */
async function firstLoad(browser: Browser, address: string): Promise<{ code: number; fonts: number }> {
  const { page } = await visit(browser);
  const session = await page.createCDPSession();
  await session.send('Network.enable');
  await session.send('Network.setBypassServiceWorker', { bypass: true });
  const kinds = new Map<string, string>();
  const sum = { code: 0, fonts: 0 };
  session.on('Network.responseReceived', ({ requestId, type }) => kinds.set(requestId, type));
  session.on('Network.loadingFinished', ({ requestId, encodedDataLength }) => {
    sum[kinds.get(requestId) === 'Font' ? 'fonts' : 'code'] += encodedDataLength;
  });
  await page.goto(address, { waitUntil: 'networkidle0' });
  await page.browserContext().close();
  return sum;
}

/** Opens the Plan page in an empty browser and waits until it can be used: the plan is drawn and solving can be started. */
async function usablePlan(browser: Browser, address: string, { client, id }: PublishedDemo): Promise<number> {
  const { page } = await visit(browser);
  await signIn(page, address, client.cookie);
  const took = await timed(async () => {
    await page.goto(`${address}/p/${id}/plan`);
    await page.waitForSelector('[data-pass]');
    await page.locator('button::-p-text(Plan again)').wait();
  });
  await page.browserContext().close();
  return took;
}

export async function appTimes(browser: Browser, address: string, demo: PublishedDemo): Promise<Measure[]> {
  const { code, fonts } = await firstLoad(browser, address);
  const plan: number[] = [];
  for (let run = 0; run < 5; run++) plan.push(await usablePlan(browser, address, demo));
  return [
    { what: "the app's first load, compressed, without fonts", result: kilobytes(code), goal: '≤ 250 kB' },
    { what: '… and its fonts', result: kilobytes(fonts), goal: '' },
    { what: 'usable Plan page in an empty browser (median of 5)', result: seconds(median(plan)), goal: '' },
  ];
}

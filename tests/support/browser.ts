import fs from 'node:fs';
import { createRequire } from 'node:module';
import type { AxeResults } from 'axe-core';
import puppeteer, { type Browser, type ElementHandle, type KeyInput, type Page } from 'puppeteer-core';

const axeSource = fs.readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** Debian's Chromium without the connections that it makes of its own accord. */
export const openBrowser = (): Promise<Browser> =>
  puppeteer.launch({
    executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
    headless: true,
    pipe: true,
    args: [
      '--no-sandbox', // only pages of our own are opened, and as root it would not start
      '--disable-gpu',
      '--disable-dev-shm-usage',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
      '--disable-extensions',
      '--font-render-hinting=none',
    ],
  });

export type Theme = 'paper' | 'dim';

export interface Visit {
  page: Page;
  /** What went wrong so far: console errors, uncaught errors, requests to other machines. */
  complaints: string[];
}

/** Opens an empty page in a browser context of its own (own cookies, storage and service worker). */
export async function visit(browser: Browser, { width = 1280, height = 800 } = {}): Promise<Visit> {
  const context = await browser.createBrowserContext();
  const page = await context.newPage();
  await page.setViewport({ width, height });
  const complaints: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(message.text());
  });
  page.on('pageerror', (error) => complaints.push(String(error)));
  page.on('request', (request) => {
    const { protocol, hostname } = new URL(request.url());
    if (/^https?:$/.test(protocol) && hostname !== '127.0.0.1') complaints.push(`request to ${request.url()}`);
  });
  return { page, complaints };
}

/** Lets a page go on with a session that was opened outside the browser (`name=value`). */
export async function signIn(page: Page, address: string, cookie: string): Promise<void> {
  const end = cookie.indexOf('=');
  await page.setCookie({ name: cookie.slice(0, end), value: cookie.slice(end + 1), url: address, httpOnly: true, sameSite: 'Lax' });
}

/** What axe-core finds on the page as it stands: rule, help and the elements. */
export async function findingsOfAxe(page: Page): Promise<string[]> {
  await page.evaluate(axeSource);
  const results = (await page.evaluate('axe.run(document, { resultTypes: ["violations"] })')) as AxeResults;
  return results.violations.map((found) => `${found.id}: ${found.help} — ${found.nodes.map((node) => node.target.join(' ')).join(', ')}`);
}

/** How many pixels the page can be scrolled sideways. */
export const sidewaysScroll = (page: Page): Promise<number> =>
  page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);

export interface Focus {
  role: string;
  name: string;
}

/** The element that has the focus; null where none has it. */
async function activeElement(page: Page): Promise<ElementHandle<Element> | null> {
  const handle = await page.evaluateHandle(() => (document.activeElement === document.body ? null : document.activeElement));
  return handle.asElement() as ElementHandle<Element> | null;
}

/** An element as a screen reader tells it. */
async function toldAs(page: Page, element: ElementHandle<Element>): Promise<Focus> {
  const session = await page.createCDPSession();
  const { nodes } = await session.send('Accessibility.getPartialAXTree', {
    backendNodeId: await element.backendNodeId(),
    fetchRelatives: false,
  });
  await session.detach();
  return { role: String(nodes[0]?.role?.value ?? ''), name: String(nodes[0]?.name?.value ?? '') };
}

/** The control that has the focus, as a screen reader tells it; null where none has it. */
export async function focused(page: Page): Promise<Focus | null> {
  const element = await activeElement(page);
  return element && toldAs(page, element);
}

export async function press(page: Page, ...keys: (KeyInput | `${'Control' | 'Alt' | 'Shift'}+${KeyInput}`)[]): Promise<void> {
  for (const chord of keys) {
    const parts = chord.length > 1 ? (chord.split('+') as KeyInput[]) : [chord as KeyInput];
    for (const held of parts.slice(0, -1)) await page.keyboard.down(held);
    await page.keyboard.press(parts.at(-1)!);
    for (const held of parts.slice(0, -1).reverse()) await page.keyboard.up(held);
  }
}

interface TabStop extends Focus {
  /** The element as a person who mends it would look for it. */
  element: string;
  /** Whether the focus changes what is painted at the element or right around it. */
  visible: boolean;
}

/** What is painted where an element stands, with a margin for its focus ring. */
async function paintedAt(page: Page, element: ElementHandle<Element>): Promise<string> {
  const box = await element.evaluate((node) => {
    const { x, y, width, height } = node.getBoundingClientRect();
    return { x: x + scrollX, y: y + scrollY, width, height };
  });
  if (box.width === 0 || box.height === 0) return '';
  const clip = { x: Math.max(0, box.x - 6), y: Math.max(0, box.y - 6), width: box.width + 12, height: box.height + 12 };
  return page.screenshot({ clip, encoding: 'base64', captureBeyondViewport: false, optimizeForSpeed: true }); // the focus scrolled it into view
}

/** Goes once through the page with Tab and looks at every control on the way. */
export async function walkByTab(page: Page, { limit = 150 } = {}): Promise<TabStop[]> {
  const stops: TabStop[] = [];
  await page.evaluate(() => document.body.querySelectorAll('[data-walked]').forEach((element) => element.removeAttribute('data-walked')));
  while (stops.length < limit) {
    await page.keyboard.press('Tab');
    const active = await activeElement(page);
    if (!active || (await active.evaluate((element) => element.hasAttribute('data-walked')))) break;
    const told = await toldAs(page, active);
    const withFocus = await paintedAt(page, active);
    const element = await active.evaluate((node) => {
      node.setAttribute('data-walked', '');
      if (node instanceof HTMLElement || node instanceof SVGElement) node.blur();
      return node.outerHTML.slice(0, 120);
    });
    const without = await paintedAt(page, active);
    stops.push({ ...told, element, visible: withFocus !== '' && withFocus !== without });
  }
  return stops;
}

/** Moves on with Tab until the control of that name has the focus; fails with the names it passed. */
export async function tabTo(page: Page, name: string | RegExp, { limit = 80 } = {}): Promise<Focus> {
  const passed: string[] = [];
  for (let count = 0; count < limit; count++) {
    await page.keyboard.press('Tab');
    const now = await focused(page);
    if (now && (typeof name === 'string' ? now.name === name : name.test(now.name))) return now;
    passed.push(now ? `${now.role} “${now.name}”` : 'nothing');
  }
  throw new Error(`Tab never came to ${String(name)}. It passed: ${passed.join(', ')}`);
}

/** Waits until a text stands on the page. */
export const seeText = (page: Page, text: string, timeout = 15_000) =>
  page.waitForFunction((wanted) => document.body.innerText.includes(wanted), { timeout }, text);

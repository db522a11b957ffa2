import type { Page } from 'puppeteer-core';
import { findChromium, launchChromium, type RunningBrowser } from './chromium';

/** There is no browser to print with; the message says what to install. */
export class NoBrowserError extends Error {}
/** The page took too long, or the browser broke twice. */
export class PrintError extends Error {}

/** Too many sheets wait already. */
export class BusyError extends Error {}

/** Sheets that may wait; with about a tenth of a second each, nobody waits longer than a few. */
const MOST_WAITING = 60;
/** Pages that print at the same time; more wait, so that a rush of sheets does not take the machine's memory. */
const AT_ONCE = 2;
const LOAD_MS = 15_000;
const PRINT_MS = 30_000;
/** A page is thrown away after so many documents, before what it gathered matters. */
const DOCUMENTS_PER_PAGE = 100;

interface WarmPage {
  page: Page;
  printed: number;
}

/** Prints HTML as PDF with one Chromium that is kept running. Documents bring everything along: whatever else a page asks for is refused. */
export class PdfPrinter {
  readonly #executable: string | null;
  #running: Promise<RunningBrowser> | null = null;
  #idle: WarmPage[] = [];
  #working = 0;
  readonly #queue: (() => void)[] = [];
  #refused = 0;

  constructor(chromium?: string) {
    this.#executable = findChromium(chromium);
  }

  /** How many requests of printed pages were refused so far; a right document makes none. */
  get refused(): number {
    return this.#refused;
  }

  /** Starts the browser and one page ahead of the first sheet. */
  async warmUp(): Promise<void> {
    await this.#turn(async () => this.#giveBack(await this.#takePage()));
  }

  /** @throws NoBrowserError, PrintError */
  async print(html: string): Promise<Uint8Array> {
    return this.#turn(async () => {
      try {
        return await this.#printOnce(html);
      } catch (error) {
        if (error instanceof NoBrowserError) throw error;
        // The browser may have died since the last sheet: once more, with a new one where it did.
        return await this.#printOnce(html).catch(async (again: unknown) => {
          await this.close();
          throw new PrintError(`The sheet could not be printed: ${again instanceof Error ? again.message : String(again)}`);
        });
      }
    });
  }

  async close(): Promise<void> {
    if (this.#running) await this.#drop(this.#running);
  }

  async #printOnce(html: string): Promise<Uint8Array> {
    const warm = await this.#takePage();
    try {
      await warm.page.setContent(html, { waitUntil: 'load', timeout: LOAD_MS });
      const pdf = await warm.page.pdf({ printBackground: true, preferCSSPageSize: true, tagged: true, outline: true, timeout: PRINT_MS });
      this.#giveBack({ page: warm.page, printed: warm.printed + 1 });
      return pdf;
    } catch (error) {
      void warm.page.close().catch(() => undefined); // It may be gone with its browser.
      throw error;
    }
  }

  async #turn<Result>(work: () => Promise<Result>): Promise<Result> {
    if (this.#queue.length >= MOST_WAITING) throw new BusyError('Many sheets are being printed just now. Try again in a minute.');
    if (this.#working >= AT_ONCE) await new Promise<void>((resolve) => this.#queue.push(resolve));
    else this.#working++;
    try {
      return await work();
    } finally {
      const next = this.#queue.shift();
      if (next) next();
      else this.#working--;
    }
  }

  async #takePage(): Promise<WarmPage> {
    const running = await this.#start();
    const warm = this.#idle.pop();
    if (warm && !warm.page.isClosed() && running.browser.connected) return warm;
    const page = await running.browser.newPage();
    await page.setJavaScriptEnabled(false);
    await page.setRequestInterception(true);
    page.on('request', (request) => {
      if (request.url().startsWith('data:') || request.url() === 'about:blank') void request.continue();
      else {
        this.#refused++;
        void request.abort('blockedbyclient');
      }
    });
    return { page, printed: 0 };
  }

  #giveBack(warm: WarmPage): void {
    if (warm.printed < DOCUMENTS_PER_PAGE) this.#idle.push(warm);
    else void warm.page.close().catch(() => undefined); // It may be gone with its browser.
  }

  async #start(): Promise<RunningBrowser> {
    const known = this.#running;
    if (known) {
      const running = await known;
      if (running.browser.connected) return running;
      await this.#drop(known);
      return this.#start();
    }
    if (this.#executable === null)
      throw new NoBrowserError(
        'No Chromium was found to print with. Install it (Debian: apt-get install chromium) or set CHROMIUM to its path.',
      );
    const launching = launchChromium(this.#executable);
    this.#running = launching;
    launching.catch(() => {
      if (this.#running === launching) this.#running = null;
    });
    return launching;
  }

  /** Ends that browser, unless another print has already replaced it. */
  async #drop(which: Promise<RunningBrowser>): Promise<void> {
    if (this.#running !== which) return;
    this.#running = null;
    this.#idle = [];
    await which.then((running) => running.end()).catch(() => undefined); // It is gone already.
  }
}

import { existsSync } from 'node:fs';
import { mkdtemp, readdir, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import puppeteer, { type Browser } from 'puppeteer-core';

/** Where Debian puts them; the headless shell starts twice as fast with half the memory. */
const PLACES = ['/usr/bin/chromium-headless-shell', '/usr/lib/chromium/chromium-headless-shell', '/usr/bin/chromium'];

const FLAGS = [
  '--disable-gpu',
  '--disable-dev-shm-usage',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-extensions',
  '--font-render-hinting=none',
  // No name resolves and every connection, loopback too, ends at a closed port.
  '--host-resolver-rules=MAP * ~NOTFOUND',
  '--proxy-server=127.0.0.1:9',
  '--proxy-bypass-list=<-loopback>',
];

const PROFILE = 'redpoll-print-';

/** The Chromium to print with: the one that was asked for, else the first of Debian's that is there. */
export function findChromium(asked: string | undefined): string | null {
  return (asked === undefined ? PLACES : [asked]).find((place) => existsSync(place)) ?? null;
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM';
  }
}

/** A process that was killed leaves its profile behind; the folder's name says whose it was. */
async function removeOrphans(folder: string): Promise<void> {
  for (const name of await readdir(folder)) {
    const pid = name.startsWith(PROFILE) ? Number(name.slice(PROFILE.length).split('-')[0]) : NaN;
    if (Number.isInteger(pid) && !isAlive(pid)) await rm(path.join(folder, name), { recursive: true, force: true });
  }
}

export interface RunningBrowser {
  browser: Browser;
  end(): Promise<void>;
}

/**
 * Starts a Chromium that reaches nothing, talks through a pipe (so that it ends with this process) and leaves no profile. It refuses its
 * sandbox to root, and has none where the system lets nobody else make namespaces, as in many containers; then it runs without: what it
 * is given to print is our own, no script runs in it, and every connection is closed.
 */
export async function launchChromium(executable: string): Promise<RunningBrowser> {
  const withoutSandbox = () => launch(executable, ['--no-sandbox']);
  return process.getuid?.() === 0 ? withoutSandbox() : launch(executable, []).catch(withoutSandbox);
}

async function launch(executable: string, flags: string[]): Promise<RunningBrowser> {
  const folder = os.tmpdir();
  await removeOrphans(folder);
  const profile = await mkdtemp(path.join(folder, `${PROFILE}${process.pid}-`));
  const removeProfile = () => rm(profile, { recursive: true, force: true, maxRetries: 5, retryDelay: 100 });
  try {
    const browser = await puppeteer.launch({
      executablePath: executable,
      headless: executable.endsWith('headless-shell') ? 'shell' : true,
      pipe: true,
      userDataDir: profile,
      args: [...FLAGS, ...flags],
      timeout: 30_000,
      protocolTimeout: 45_000,
      env: { PATH: process.env.PATH, HOME: profile, LANG: 'C.UTF-8', TZ: 'UTC' },
    });
    return {
      browser,
      async end() {
        await browser.close();
        await removeProfile();
      },
    };
  } catch (error) {
    await removeProfile();
    throw error;
  }
}

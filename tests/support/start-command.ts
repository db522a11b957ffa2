import { spawn, type ChildProcess } from 'node:child_process';
import fs from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';

/** A port that nothing listens on at this moment. */
export function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = net.createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      if (address === null || typeof address === 'string') return reject(new Error('no port was given'));
      probe.close(() => resolve(address.port));
    });
  });
}

/** A folder that PostgreSQL's user can pass through, also when the tests run as root. */
export function openFolder(): string {
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'redpoll-data-'));
  fs.chmodSync(folder, 0o755);
  return folder;
}

export interface Started {
  process: ChildProcess;
  /** Everything said so far. */
  words: () => string;
  /** Resolves with the exit code (or the signal's name). */
  ended: Promise<number | string>;
  /** Resolves when the text was said; rejects when the command ends without saying it. */
  says: (text: string) => Promise<void>;
}

/** Runs the start command of a checkout (this one) as a person would, with settings of its own. */
export function startCommand(env: Record<string, string>, checkout = '.'): Started {
  const command = path.join(checkout, 'server/bin/start.mjs');
  const child = spawn(process.execPath, [command], { env: { ...process.env, ...env }, stdio: ['ignore', 'pipe', 'pipe'] });
  let said = '';
  for (const stream of [child.stdout, child.stderr]) stream.setEncoding('utf8').on('data', (text: string) => (said += text));
  const ended = new Promise<number | string>((resolve) => child.once('close', (code, signal) => resolve(code ?? signal ?? 'gone')));
  const says = (text: string) =>
    new Promise<void>((resolve, reject) => {
      const look = () => (said.includes(text) ? resolve() : undefined);
      look();
      child.stdout.on('data', look);
      child.stderr.on('data', look);
      void ended.then(() => reject(new Error(`The start command never said "${text}". It said:\n${said}`)));
    });
  return { process: child, words: () => said, ended, says };
}

/** Command lines of the living processes whose command or environment names a folder. */
export function processesNaming(folder: string): string[] {
  const lines: string[] = [];
  for (const entry of fs.readdirSync('/proc')) {
    if (!/^\d+$/.test(entry)) continue;
    try {
      const line = fs.readFileSync(`/proc/${entry}/cmdline`, 'utf8').replaceAll('\0', ' ');
      const environment = Number(entry) === process.pid ? '' : fs.readFileSync(`/proc/${entry}/environ`, 'utf8');
      if (`${line} ${environment}`.includes(folder)) lines.push(line);
    } catch (error) {
      if (!(error instanceof Error && 'code' in error && ['ENOENT', 'ESRCH', 'EACCES'].includes(String(error.code)))) throw error; // it ended meanwhile, or is another user's
    }
  }
  return lines;
}

// Programs that the start scripts run, so that none is left behind. No dependencies: runs before `npm ci`.
import { spawn } from 'node:child_process';
import fs from 'node:fs';

/** Debian's setpriv (essential package) lets the kernel end a child even if this process is killed with -9. */
const SETPRIV = '/usr/bin/setpriv';
const running = new Set();

/**
 * Starts a program in a process group of its own: Ctrl-C at the terminal reaches this process alone, which ends the others in order.
 * @param {string} program @param {string[]} args @param {import('node:child_process').SpawnOptions} [options]
 */
export function start(program, args, options = {}) {
  const [file, all] = fs.existsSync(SETPRIV) ? [SETPRIV, ['--pdeathsig', 'TERM', program, ...args]] : [program, args];
  const child = spawn(file, all, { ...options, detached: true });
  running.add(child);
  child.once('exit', () => running.delete(child));
  child.once('error', () => running.delete(child));
  return child;
}

/**
 * Runs a program to its end and gives what it wrote.
 * @param {string} program @param {string[]} args @param {{ env?: NodeJS.ProcessEnv, show?: boolean }} [options] show: let it write to the terminal
 * @returns {Promise<{ code: number, output: string }>}
 */
export function run(program, args, { env, show = false } = {}) {
  return new Promise((resolve) => {
    const child = start(program, args, {
      env: env ?? process.env,
      stdio: ['ignore', show ? 'inherit' : 'pipe', show ? 'inherit' : 'pipe'],
    });
    let output = '';
    for (const stream of [child.stdout, child.stderr]) stream?.setEncoding('utf8').on('data', (text) => (output += text));
    child.once('error', (error) => resolve({ code: 127, output: String(error) }));
    child.once('close', (code) => resolve({ code: code ?? 1, output }));
  });
}

const LOG_LIMIT = 10e6; // bytes; one older log is kept

/**
 * Opens a log to append to; a long one is set aside first.
 * @param {string} file
 */
export function openLog(file) {
  if (fs.existsSync(file) && fs.statSync(file).size > LOG_LIMIT) fs.renameSync(file, `${file}.1`);
  return fs.openSync(file, 'a', 0o640);
}

/**
 * Asks a child and its group to end, and insists after ten seconds.
 * @param {import('node:child_process').ChildProcess} child
 */
export async function end(child) {
  if (!child.pid || child.exitCode !== null || child.signalCode !== null) return;
  const gone = new Promise((resolve) => child.once('exit', resolve));
  const signal = (name) => {
    try {
      process.kill(-child.pid, name);
    } catch (error) {
      if (error.code !== 'ESRCH') throw error;
    }
  };
  signal('SIGTERM');
  const insist = setTimeout(() => signal('SIGKILL'), 10_000);
  await gone;
  clearTimeout(insist);
}

export const endAll = () => Promise.all([...running].map(end));

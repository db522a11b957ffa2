import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { freePort, openFolder, startCommand } from '../support/start-command';
import { median, seconds, timed, type Measure } from './table';

/** Runs the start command of a checkout until it serves, and ends it again. */
async function startOnce(folder: string, checkout: string): Promise<number> {
  const port = await freePort();
  let one: ReturnType<typeof startCommand> | undefined;
  const took = await timed(async () => {
    one = startCommand({ REDPOLL_DATA: folder, PORT: String(port), DATABASE_URL: '' }, checkout);
    await one.says('Redpoll is at');
  });
  one?.process.kill('SIGTERM');
  await one?.ended;
  return took;
}

/** A copy of this checkout's sources with the npm packages, never built and without data. */
function copyOfCheckout(): string {
  const copy = path.join(openFolder(), 'checkout');
  const files = execFileSync('git', ['ls-files', '-z'], { encoding: 'utf8' })
    .split('\0')
    .filter((file) => fs.existsSync(file) && file !== '');
  for (const file of files) fs.cpSync(file, path.join(copy, file));
  execFileSync('cp', ['-al', 'node_modules', copy]);
  return copy;
}

export async function startTimes(): Promise<Measure[]> {
  const copy = copyOfCheckout();
  const folder = path.join(copy, '.data');
  const cold = await startOnce(folder, copy);
  const warm: number[] = [];
  for (let run = 0; run < 3; run++) warm.push(await startOnce(folder, copy));
  fs.rmSync(path.dirname(copy), { recursive: true });
  return [
    { what: 'npm start to serving, packages there, nothing built, no data', result: seconds(cold), goal: '' },
    { what: 'npm start to serving, warm (median of 3)', result: seconds(median(warm)), goal: '≤ 6 s' },
  ];
}

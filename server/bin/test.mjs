// `npm test` and its long sisters (soak, bench, pictures): the same set-up as `npm start`, then the checks. No dependencies: runs before `npm ci`.
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { endAll, run } from './processes.mjs';
import { setUp } from './setup.mjs';
import { say, tellTrouble } from './words.mjs';

process.chdir(path.resolve(import.meta.dirname, '../..'));

const tool = (name, ...args) => [`node_modules/.bin/${name}`, args];
const CHECKS = [
  ['Format', ...tool('prettier', '--check', '--log-level', 'warn', '.')],
  ['Lint and import boundaries', ...tool('eslint', '.', '--max-warnings', '0')],
  ['Types of the app', ...tool('vue-tsc', '--noEmit', '-p', 'tsconfig.app.json')],
  ['Types of the server and the tests', ...tool('tsc', '--noEmit', '-p', 'tsconfig.node.json')],
  ['Types of shared/', ...tool('tsc', '--noEmit', '-p', 'tsconfig.shared.json')],
  ['Types of the tests in a browser', ...tool('tsc', '--noEmit', '-p', 'tsconfig.browser-tests.json')],
];

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => void endAll().then(() => process.exit(130)));

/** Runs the static checks; each counts as one in the closing line. */
async function check() {
  const tally = { passed: 0, failed: 0, skipped: 0 };
  for (const [what, program, args] of CHECKS) {
    const began = performance.now();
    const { code, output } = await run(program, args);
    say(`${code === 0 ? '✓' : '✗'} ${what} (${((performance.now() - began) / 1000).toFixed(1)} s)`);
    if (code !== 0) say(output);
    tally[code === 0 ? 'passed' : 'failed']++;
  }
  return tally;
}

/** Runs vitest; a reporter writes the tally that a person would otherwise have to add up. */
async function vitest(args) {
  const file = path.join(fs.mkdtempSync(path.join(os.tmpdir(), 'redpoll-tally-')), 'tally.json');
  const { code } = await run('node_modules/.bin/vitest', ['run', ...args], { show: true, env: { ...process.env, REDPOLL_TALLY: file } });
  const tally = fs.existsSync(file) ? JSON.parse(fs.readFileSync(file, 'utf8')) : { passed: 0, failed: 0, skipped: 0 };
  fs.rmSync(path.dirname(file), { recursive: true });
  // Vitest may also fail without a failed test (no test found, it was killed): that is one failure too.
  return code !== 0 && tally.failed === 0 ? { ...tally, failed: 1 } : tally;
}

const add = (a, b) => ({ passed: a.passed + b.passed, failed: a.failed + b.failed, skipped: a.skipped + b.skipped });

async function test() {
  const began = performance.now();
  await setUp({ database: true, tests: true, built: true });
  const ready = performance.now();
  say(`Set-up: ${((ready - began) / 1000).toFixed(1)} s\n`);
  const wanted = process.argv[2];
  if (wanted === '--bench' || wanted === '--pictures') {
    const { code } = await run('node_modules/.bin/tsx', [`tests/${wanted.slice(2)}/run.ts`, ...process.argv.slice(3)], { show: true });
    return code;
  }
  const tally = wanted === '--soak' ? await vitest(['--config', 'tests/soak/vitest.config.ts']) : add(await check(), await vitest([]));
  say(`\nWithout the set-up: ${((performance.now() - ready) / 1000).toFixed(1)} s`);
  say(`${tally.passed} passed, ${tally.failed} failed, ${tally.skipped} skipped`);
  return tally.failed ? 1 : 0;
}

try {
  process.exitCode = await test();
} catch (error) {
  tellTrouble(error);
  say('0 passed, 1 failed, 0 skipped');
  process.exitCode = 1;
}

// Makes ready what is missing: Debian's packages, the npm packages, the build. No dependencies: runs before `npm ci`.
import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import { claim } from './claim.mjs';
import { hasPostgres } from './postgres.mjs';
import { run } from './processes.mjs';
import { buildIsFresh } from './sources.mjs';
import { say, step, Trouble, troubleFrom } from './words.mjs';

const NO_MAIN_CLUSTER = '/etc/postgresql-common/createcluster.d/no-main-cluster.conf';
const CHROMIUM = '/usr/bin/chromium';
// Debian's Chromium brings no letters of its own: Latin, CJK and emoji of names and titles must print.
const FONTS = ['fonts-liberation', 'fonts-droid-fallback', 'fonts-noto-color-emoji'];
const BUILDING = 'node_modules/.cache/redpoll-build.json';

/**
 * What this machine lacks, as names of Debian packages.
 * @param {{ database: boolean, tests: boolean }} wanted
 */
function missingPackages({ database, tests }) {
  const missing = [];
  if (database && !hasPostgres()) missing.push('postgresql');
  if (!fs.existsSync(process.env.CHROMIUM ?? CHROMIUM)) missing.push('chromium', ...FONTS);
  if (tests && !fs.existsSync('/usr/bin/pdftotext')) missing.push('poppler-utils');
  return missing;
}

/** How this process becomes root for the installation: nothing to add, sudo without a password, or not at all. */
function rootPrefix() {
  if (process.getuid() === 0) return [];
  return spawnSync('sudo', ['-n', 'true']).status === 0 ? ['sudo', '-n'] : null;
}

async function installDebianPackages(wanted) {
  const missing = missingPackages(wanted);
  if (!missing.length) return;
  const names = missing.join(' ');
  if (!fs.existsSync('/usr/bin/apt-get'))
    throw new Trouble(
      `Redpoll needs PostgreSQL and Chromium, and this machine has no apt-get to install ${names} with.`,
      'Install them in your own way and name them: PG_BIN=/folder/of/initdb CHROMIUM=/path/of/chromium npm start',
    );
  const prefix = rootPrefix();
  if (!prefix)
    throw new Trouble(
      `These Debian packages are missing, and only root may install them: ${names}`,
      `Run this once, then start again:\n  sudo apt-get install --no-install-recommends ${names}`,
    );
  await step(`Installing from Debian: ${names} (needs the network; some minutes the first time)`, () => aptInstall(prefix, missing));
}

async function aptInstall(prefix, names) {
  const asRoot = (program, args) => run(prefix[0] ?? program, prefix.length ? [...prefix.slice(1), program, ...args] : args);
  // Debian's package would make and start a cluster of its own on port 5432; this machine's owner did not ask for one.
  const quiet = names.includes('postgresql') && !fs.existsSync(NO_MAIN_CLUSTER);
  if (quiet) {
    const write = `mkdir -p ${NO_MAIN_CLUSTER.replace(/\/[^/]*$/, '')} && echo 'create_main_cluster = false' > ${NO_MAIN_CLUSTER}`;
    await asRoot('/bin/sh', ['-c', write]);
  }
  try {
    const update = await asRoot('/usr/bin/apt-get', ['update', '-q']);
    if (update.code !== 0) say('  The list of packages could not be renewed; trying with the list that is here.');
    const options = ['-o', 'DPkg::Lock::Timeout=300', '-o', 'Dpkg::Options::=--force-confold', '-o', 'Acquire::Retries=3'];
    const install = ['DEBIAN_FRONTEND=noninteractive', 'apt-get', 'install', '-y', '-q', '--no-install-recommends', ...options, ...names];
    const { code, output } = await asRoot('/usr/bin/env', install);
    if (code !== 0)
      throw troubleFrom(`Installing ${names.join(' ')} from Debian`, output + (update.code ? update.output : ''), { network: true });
  } finally {
    if (quiet) await asRoot('/bin/rm', ['-f', NO_MAIN_CLUSTER]);
  }
}

const lockedPackages = (file) => (fs.existsSync(file) ? JSON.parse(fs.readFileSync(file, 'utf8')).packages : {});

/** Whether node_modules holds what the lock file asks for (npm leaves its own record there when an installation is whole). */
function npmPackagesInPlace() {
  const wanted = lockedPackages('package-lock.json');
  const there = lockedPackages('node_modules/.package-lock.json');
  // Packages for other machines (optional, by os or processor) are in the lock and rightly not in the record.
  return Object.entries(wanted).every(
    ([place, { version, optional }]) => place === '' || there[place]?.version === version || (optional && !there[place]),
  );
}

async function installNpmPackages() {
  if (npmPackagesInPlace()) return;
  const free = fs.statfsSync('.');
  if (free.bavail * free.bsize < 600e6)
    throw new Trouble('The npm packages need 600 MB, and this disk has less.', 'Free some space (df -h shows where), then start again.');
  await step('Installing the npm packages (needs the network; one or two minutes)', async () => {
    const npm = process.env.npm_execpath ? [process.execPath, process.env.npm_execpath] : ['npm'];
    // The build needs the development packages too, whatever NODE_ENV says.
    const args = ['ci', '--include=dev', '--no-audit', '--no-fund', '--prefer-offline', '--loglevel=error'];
    const { code, output } = await run(npm[0], [...npm.slice(1), ...args]);
    if (code !== 0) throw troubleFrom('Installing the npm packages', output, { network: true });
  });
}

/** Builds; a second start or test run that wants to build meanwhile waits, and finds it done. */
async function build() {
  let taken = claim(BUILDING, {});
  for (; taken.holder; taken = claim(BUILDING, {})) await new Promise((resolve) => setTimeout(resolve, 200));
  try {
    if (buildIsFresh()) return;
    const { code, output } = await run(process.execPath, ['server/bin/build.mjs']);
    if (code !== 0) throw troubleFrom('Building the app', output);
  } finally {
    taken.release();
  }
}

/**
 * Everything that a start needs on this machine.
 * @param {{ database: boolean, tests: boolean, built: boolean }} wanted a private database, the tools of the tests, the built app
 */
export async function setUp({ database, tests, built }) {
  await installDebianPackages({ database, tests });
  await installNpmPackages();
  if (built && !buildIsFresh()) await step('Building the app (after every change of its sources)', build);
}

// Whether the built app is older than its sources. No dependencies: runs before `npm ci`.
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';

const SOURCES = ['src', 'server', 'shared', 'templates', 'public', 'index.html', 'package-lock.json', 'server/bin/build.mjs'];
const CONFIGS = ['vite.config.ts', 'tailwind.config.ts', 'postcss.config.js', 'tsconfig.base.json', 'tsconfig.app.json'];
const STAMP = 'build/sources';
const PRODUCTS = ['dist/index.html', 'build/index.js'];

/** Files under a path, in a fixed order. */
function filesUnder(place) {
  const stat = fs.statSync(place, { throwIfNoEntry: false });
  if (!stat) return [];
  if (stat.isFile()) return [place];
  return fs
    .readdirSync(place)
    .sort()
    .flatMap((name) => filesUnder(path.join(place, name)));
}

/** A fingerprint of everything the build reads. */
export function fingerprint() {
  const hash = createHash('sha256');
  for (const file of [...SOURCES, ...CONFIGS].flatMap(filesUnder)) hash.update(`${file}\0`).update(fs.readFileSync(file)).update('\0');
  return hash.digest('hex');
}

export function buildIsFresh() {
  if (!PRODUCTS.every((file) => fs.existsSync(file)) || !fs.existsSync(STAMP)) return false;
  return fs.readFileSync(STAMP, 'utf8') === fingerprint();
}

/** Marks the build as not whole; `mark` follows when it is. A build that was interrupted is done again. */
export const unmark = () => fs.rmSync(STAMP, { force: true });
/** @param {string} print the fingerprint taken before the build began */
export const mark = (print) => fs.writeFileSync(STAMP, print);

// The `plan` command. Runs the built planner where the build is fresh, else the sources through tsx; needs no server and no database.
import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { buildIsFresh } from './sources.mjs';

const root = fileURLToPath(new URL('../..', import.meta.url));
// A file is named as seen from where the command was typed, also when npm runs it from the project's folder.
const from = process.env.npm_lifecycle_event === 'plan' && process.env.INIT_CWD ? process.env.INIT_CWD : process.cwd();
const args = process.argv.slice(2);
process.chdir(root);
// A reader that has seen enough, such as `head`, is no fault.
process.stdout.on('error', (error) => process.exit(error.code === 'EPIPE' ? 0 : 1));

const built = 'build/plan.js';
const own = `build/plan-${process.pid}`;

/** Sheets are printed from Vue components, which tsx cannot load: they need a build, if need be one for this run alone. */
async function command() {
  if (fs.existsSync(built) && buildIsFresh()) return import(pathToFileURL(path.resolve(built)).href);
  if (!args.some((arg) => arg === '--sheets' || arg.startsWith('--sheets='))) {
    const { tsImport } = await import('tsx/esm/api');
    return tsImport('./planCommand.ts', import.meta.url);
  }
  const { buildServer } = await import('./build.mjs');
  await buildServer({ outDir: own });
  return import(pathToFileURL(path.resolve(own, 'plan.js')).href);
}

try {
  const { planCommand } = await command();
  process.exitCode = await planCommand(args, from);
} catch (error) {
  const missing = error?.code === 'ERR_MODULE_NOT_FOUND';
  console.error(
    missing ? 'Something is not installed yet: run npm ci, or npm start once.' : `The plan command failed: ${error?.message ?? error}`,
  );
  process.exitCode = 1;
} finally {
  fs.rmSync(own, { recursive: true, force: true });
}

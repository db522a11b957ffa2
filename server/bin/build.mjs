// Builds the app (dist/) and the server (build/). Run as a program, or used by the development server.
import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import vue from '@vitejs/plugin-vue';
import { build } from 'vite';
import { fingerprint, mark, unmark } from './sources.mjs';

/** The server's programs: the server itself, the plan command, and one file per worker thread. */
function serverEntries() {
  const named = { index: 'server/index.ts', plan: 'server/bin/planCommand.ts' };
  const entries = Object.entries(named).filter(([, file]) => fs.existsSync(file));
  for (const file of fs.readdirSync('server', { recursive: true }))
    if (file.endsWith('.worker.ts')) entries.push([path.basename(file, '.ts'), path.join('server', file)]);
  return Object.fromEntries(entries);
}

/**
 * The server as plain JavaScript, npm packages left outside. Vite does it, so that the printed documents (templates/*.vue)
 * are compiled for the server by the same plugin as for the preview.
 * @param {{ outDir?: string, watch?: boolean }} [options]
 */
export const buildServer = ({ outDir = 'build', watch = false } = {}) =>
  build({
    configFile: false,
    publicDir: false,
    logLevel: 'warn',
    plugins: [vue()],
    build: {
      ssr: true,
      target: 'node20',
      outDir,
      emptyOutDir: true,
      sourcemap: true,
      minify: false,
      watch: watch ? {} : null,
      rollupOptions: {
        checks: { bundlerTimings: false },
        input: serverEntries(),
        output: { entryFileNames: '[name].js', chunkFileNames: 'parts/[name]-[hash].js' },
      },
    },
  });

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const print = fingerprint();
  unmark();
  try {
    await build({ logLevel: 'warn' });
    await buildServer();
    mark(print);
  } catch (error) {
    console.error(error.message); // names file and line; where in Vite it was noticed helps nobody
    process.exitCode = 1;
  }
}

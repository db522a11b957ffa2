// `npm run dev`: Vite serves the app's sources and passes the API on; the server is built and started again after each change.
import net from 'node:net';
import { createServer } from 'vite';
import { buildServer } from './build.mjs';
import { end } from './processes.mjs';
import { startServer, untilServing } from './server.mjs';
import { say } from './words.mjs';

const DEVELOPMENT_BUILD = 'build/dev';

const freePort = () =>
  new Promise((resolve) => {
    const probe = net.createServer().listen(0, '127.0.0.1', () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });

/** @param {{ port: number, host: string, dataFolder: string, databaseUrl: string, cleanUp: (() => unknown)[] }} settings */
export async function serveForDevelopers({ cleanUp, ...settings }) {
  const behind = { ...settings, host: '127.0.0.1', port: await freePort() };
  const target = `http://${behind.host}:${behind.port}`;
  const app = await createServer({
    server: { host: settings.host, port: settings.port, strictPort: true, proxy: { '/api': target, '/calendar': target } },
  });
  cleanUp.push(() => app.close());
  await app.listen();

  let server = null;
  let turn = Promise.resolve();
  async function restart() {
    if (server) await end(server);
    server = startServer({ ...behind, dev: true, program: `${DEVELOPMENT_BUILD}/index.js` });
    await untilServing(server, behind);
    say(`The server runs. The app: http://${settings.host}:${settings.port}`);
  }
  const watcher = await buildServer({ outDir: DEVELOPMENT_BUILD, watch: true });
  cleanUp.push(() => watcher.close());
  watcher.on('event', (event) => {
    if (event.code === 'ERROR') console.error(event.error.message);
    if (event.code === 'END')
      turn = turn.then(restart).catch(() => say('The server did not start; its words stand above. It waits for the next change.'));
  });
}

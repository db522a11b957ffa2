import { spawn, type ChildProcess } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { freePort } from './start-command';

export interface RunningServer {
  address: string;
  port: number;
  process: ChildProcess;
  /** Ends it as the start command does, and waits until it is gone. */
  stop: () => Promise<void>;
  /** Ends it without any chance to tidy up. */
  kill: () => Promise<void>;
}

interface ServerOptions {
  databaseUrl: string;
  /** Given where a server comes back under the same address. */
  port?: number;
  secret?: string;
  env?: Record<string, string>;
}

/** Starts the built server as a process of its own, with limits that a test of many productions does not meet. */
export async function startServer({ databaseUrl, port, secret, env }: ServerOptions): Promise<RunningServer> {
  const chosen = port ?? (await freePort());
  const child = spawn(process.execPath, ['--enable-source-maps', 'build/index.js'], {
    stdio: ['ignore', 'pipe', 'pipe'],
    env: {
      ...process.env,
      NODE_ENV: 'production',
      LOG_LEVEL: 'error',
      SIGN_IN_LIMIT: '10000',
      NEW_LIMIT: '10000',
      ...env,
      DATABASE_URL: databaseUrl,
      HOST: '127.0.0.1',
      PORT: String(chosen),
      JWT_SECRET: secret ?? randomBytes(32).toString('hex'),
    },
  });
  let said = '';
  for (const stream of [child.stdout, child.stderr]) stream.setEncoding('utf8').on('data', (text: string) => (said += text));
  const gone = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  const address = `http://127.0.0.1:${chosen}`;
  for (;;) {
    if (child.exitCode !== null || child.signalCode !== null) throw new Error(`The server ended while it was starting:\n${said}`);
    const answer = await fetch(`${address}/api/health`).catch(() => null); // not listening yet
    if (answer?.ok) break;
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
  const end = async (signal: 'SIGTERM' | 'SIGKILL') => {
    child.kill(signal);
    await gone;
  };
  return { address, port: chosen, process: child, stop: () => end('SIGTERM'), kill: () => end('SIGKILL') };
}

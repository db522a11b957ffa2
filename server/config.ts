import { z } from 'zod';

const LOOPBACK = new Set(['127.0.0.1', '::1', 'localhost']);

const list = z
  .string()
  .default('')
  .transform((value) =>
    value
      .split(',')
      .map((name) => name.trim().toLowerCase())
      .filter((name) => name !== ''),
  );

const environment = z.object({
  DATABASE_URL: z.string().regex(/^postgres(ql)?:\/\//, { error: 'DATABASE_URL must be the address of a PostgreSQL database' }),
  PORT: z.coerce.number().int().min(0).max(65_535).default(3000),
  HOST: z.string().default('127.0.0.1'),
  /** Host names, besides the loopback ones, under which the app is reached; comma-separated. */
  PUBLIC_HOST: list,
  REDPOLL_DATA: z.string().default('.data'),
  JWT_SECRET: z.string().min(32, { error: 'JWT_SECRET must have at least 32 characters' }),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'),
  /** Folder of the built app. */
  DIST: z.string().default('dist'),
  /** Folder of the starting points. */
  TEMPLATES: z.string().default('templates/productions'),
  CHROMIUM: z.string().optional(),
  /** Attempts to sign in or to create an account, per address and account in 15 minutes. */
  SIGN_IN_LIMIT: z.coerce.number().int().min(1).default(20),
  /** Trials, imports and new productions, per address in 15 minutes. */
  NEW_LIMIT: z.coerce.number().int().min(1).default(120),
  /** bcrypt's cost: each step doubles the work of guessing a password. */
  PASSWORD_COST: z.coerce.number().int().min(4).max(14).default(11),
});

/** The environment, read once. */
export interface Config {
  databaseUrl: string;
  port: number;
  host: string;
  publicHosts: string[];
  dataFolder: string;
  jwtSecret: string;
  logLevel: z.infer<typeof environment>['LOG_LEVEL'];
  dist: string;
  startingPoints: string;
  chromium: string | undefined;
  signInLimit: number;
  newLimit: number;
  passwordCost: number;
}

/** Reads the settings; throws an Error that names each wrong one. */
export function readConfig(env: Record<string, string | undefined>): Config {
  const given = Object.fromEntries(Object.entries(env).filter(([, value]) => value !== undefined && value !== ''));
  const parsed = environment.safeParse(given);
  if (!parsed.success) {
    const faults = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`The settings are wrong:\n${faults.join('\n')}`);
  }
  const read = parsed.data;
  return {
    databaseUrl: read.DATABASE_URL,
    port: read.PORT,
    host: read.HOST,
    publicHosts: read.PUBLIC_HOST,
    dataFolder: read.REDPOLL_DATA,
    jwtSecret: read.JWT_SECRET,
    logLevel: read.LOG_LEVEL,
    dist: read.DIST,
    startingPoints: read.TEMPLATES,
    chromium: read.CHROMIUM,
    signInLimit: read.SIGN_IN_LIMIT,
    newLimit: read.NEW_LIMIT,
    passwordCost: read.PASSWORD_COST,
  };
}

/** Whether a host name is this machine's own: `localhost`, `127.0.0.1`, `[::1]`, with or without a port. */
export const isLoopback = (host: string) => LOOPBACK.has(hostName(host));

/** The name of a Host header without its port, in small letters and without the brackets of IPv6. */
export function hostName(host: string): string {
  const match = /^\[([^\]]+)\](?::\d+)?$/.exec(host);
  if (match) return match[1]!.toLowerCase();
  return (/^[^:]*:\d+$/.test(host) ? host.slice(0, host.lastIndexOf(':')) : host).toLowerCase();
}

import type { CookieOptions, Request, Response } from 'express';
import jwt from 'jsonwebtoken';
import { Op } from 'sequelize';
import { z } from 'zod';
import type { Context } from '../context';
import type { UserModel } from '../models/accounts';
import type { Actor } from './actor';
import { Refusal } from './errors';
import { trialAllowed } from './trial';

const COOKIE = 'redpoll';
const DAY = 24 * 60 * 60 * 1000;
const SESSION_DAYS = 30;

const token = z.object({ sub: z.uuid(), sid: z.uuid() });

/** Cookies are for https alone where the request came by it, also to a proxy before us; on loopback there is only http. */
const cookieOptions = (request: Request): CookieOptions => ({
  httpOnly: true,
  sameSite: 'lax',
  secure: request.secure || request.headers['x-forwarded-proto'] === 'https',
  path: '/',
});

/** Opens a session that PostgreSQL knows and gives its token to the browser. */
export async function openSession(context: Context, request: Request, response: Response, userId: string): Promise<string> {
  const now = context.now();
  const session = await context.db.sessions.create({
    userId,
    createdAt: now,
    expiresAt: new Date(now.getTime() + SESSION_DAYS * DAY),
    endedAt: null,
  });
  const signed = jwt.sign({ sid: session.id, iat: Math.floor(now.getTime() / 1000) }, context.config.jwtSecret, {
    algorithm: 'HS256',
    subject: userId,
    expiresIn: `${SESSION_DAYS}d`,
  });
  response.cookie(COOKIE, signed, { ...cookieOptions(request), maxAge: SESSION_DAYS * DAY });
  return session.id;
}

export function clearSession(request: Request, response: Response): void {
  response.clearCookie(COOKIE, cookieOptions(request));
}

/** Ends sessions of a user: one, or all but one. */
export async function endSessions(context: Context, userId: string, which: { only: string } | { except: string }): Promise<void> {
  await context.db.sessions.update(
    { endedAt: context.now() },
    { where: { userId, endedAt: null, id: 'only' in which ? which.only : { [Op.ne]: which.except } } },
  );
}

function readToken(context: Context, cookie: string): z.infer<typeof token> | null {
  try {
    const claims = jwt.verify(cookie, context.config.jwtSecret, {
      algorithms: ['HS256'],
      clockTimestamp: Math.floor(context.now().getTime() / 1000),
    });
    return token.safeParse(claims).data ?? null;
  } catch (error) {
    if (error instanceof jwt.JsonWebTokenError) return null;
    throw error;
  }
}

const cookieOf = (request: Request): string | null => {
  const value = (request.cookies as Record<string, unknown>)[COOKIE];
  return typeof value === 'string' && value !== '' ? value : null;
};

export const hasCookie = (request: Request) => cookieOf(request) !== null;

/** Who asks, or null: no cookie, a forged or expired one, an ended session, or a trial that is asked for from elsewhere. */
export async function actorOf(context: Context, request: Request): Promise<Actor | null> {
  const cookie = cookieOf(request);
  const claims = cookie === null ? null : readToken(context, cookie);
  if (!claims) return null;
  const session = await context.db.sessions.findOne({
    where: { id: claims.sid, userId: claims.sub, endedAt: null, expiresAt: { [Op.gt]: context.now() } },
    include: [{ association: 'user', required: true }],
  });
  if (!session) return null;
  const user = session.get('user') as UserModel;
  const trial = user.email === null;
  if (trial && !trialAllowed(context.config, request)) return null;
  return { userId: user.id, sessionId: session.id, name: user.name, email: user.email, trial };
}

/** Who asks; refused where nobody is signed in. */
export async function demandActor(context: Context, request: Request): Promise<Actor> {
  const actor = await actorOf(context, request);
  if (actor) return actor;
  throw new Refusal(
    'not-signed-in',
    hasCookie(request)
      ? 'Your session has ended. Sign in again; what you typed is still on this page.'
      : 'Sign in first, or open a trial on the start page.',
  );
}

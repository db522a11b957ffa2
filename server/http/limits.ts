import { createHash } from 'node:crypto';
import type { Request, RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { Refusal } from './errors';

const QUARTER_OF_AN_HOUR = 15 * 60 * 1000;
const EXCESS = 'Too many attempts from here. Wait a quarter of an hour, then try again.';

const addressOf = (request: Request) => ipKeyGenerator(request.ip ?? '');

function limiter(limit: number, keyOf: (request: Request) => string): RequestHandler {
  return rateLimit({
    windowMs: QUARTER_OF_AN_HOUR,
    limit,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    keyGenerator: keyOf,
    handler: (_request, _response, next) => next(new Refusal('too-many', EXCESS)),
  });
}

/** At most so many requests per address. */
export const perAddress = (limit: number) => limiter(limit, addressOf);

/** At most so many requests per address and account named in the body: guessing one password does not lock others out. */
export const perAccount = (limit: number) =>
  limiter(limit, (request) => {
    const body: unknown = request.body;
    const named = typeof body === 'object' && body !== null && 'email' in body ? String(body.email).toLowerCase() : '';
    return `${addressOf(request)} ${createHash('sha256').update(named).digest('base64')}`;
  });

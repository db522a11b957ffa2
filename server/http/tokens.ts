import { createHash, randomBytes } from 'node:crypto';

/** A token nobody guesses: 256 random bits, in letters that stand in an address. */
export const newToken = () => randomBytes(32).toString('base64url');

/** What is kept of a token. It is random and long, so a plain hash keeps it safe. */
export const hashOf = (token: string) => createHash('sha256').update(token).digest('hex');

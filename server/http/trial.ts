import type { Request } from 'express';
import { isLoopback, type Config } from '../config';

const PASSED_ON = ['forwarded', 'via', 'x-forwarded-for', 'x-forwarded-host', 'x-forwarded-proto', 'x-forwarded-port', 'x-real-ip'];

const isLoopbackAddress = (address: string | undefined) => address !== undefined && (/^(::ffff:)?127\./.test(address) || address === '::1');

/**
 * Whether a trial may be opened and used by this request: the server listens on loopback only, the page was asked for by a name of
 * this machine, the connection comes from it, and nothing passed the request on.
 */
export function trialAllowed(config: Config, request: Request): boolean {
  return (
    isLoopback(config.host) &&
    isLoopback(request.headers.host ?? '') &&
    isLoopbackAddress(request.socket.remoteAddress) &&
    !Object.keys(request.headers).some((name) => PASSED_ON.includes(name) || name.startsWith('x-forwarded-'))
  );
}

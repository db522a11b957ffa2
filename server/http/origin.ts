import type { Request } from 'express';

/** The origin under which a request reached us; a proxy that speaks https in front of us says so in X-Forwarded-Proto. */
export function originOf(request: Request): string {
  const forwarded = request.get('x-forwarded-proto')?.split(',')[0]?.trim();
  return `${forwarded === 'https' ? 'https' : request.protocol}://${request.get('host') ?? 'localhost'}`;
}

import type { Request } from 'express';
import type { SessionResponse } from '../../../shared/contracts/api';
import type { Context } from '../../context';
import { trialAllowed } from '../../http/trial';

export function presentSession(
  { config }: Context,
  request: Request,
  user: { id: string; name: string; email: string | null } | null,
): SessionResponse {
  return {
    user: user && { id: user.id, name: user.name, email: user.email, trial: user.email === null },
    trialAllowed: trialAllowed(config, request),
  };
}

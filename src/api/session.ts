import { z } from 'zod';
import {
  sessionResponse,
  type SessionResponse,
  type accountRequest,
  type passwordRequest,
  type signInRequest,
} from '../../shared/contracts/api';
import { request } from './http';

export const readSession = (): Promise<SessionResponse> => request('/api/session', sessionResponse);

export const signIn = (body: z.input<typeof signInRequest>): Promise<SessionResponse> =>
  request('/api/session', sessionResponse, { method: 'POST', body });

export const openTrial = (): Promise<SessionResponse> => request('/api/session/trial', sessionResponse, { method: 'POST' });

export const signOut = (): Promise<unknown> => request('/api/session', z.unknown(), { method: 'DELETE' });

export const createAccount = (body: z.input<typeof accountRequest>): Promise<SessionResponse> =>
  request('/api/account', sessionResponse, { method: 'POST', body });

export const changePassword = (body: z.input<typeof passwordRequest>): Promise<unknown> =>
  request('/api/account/password', z.unknown(), { method: 'PUT', body });

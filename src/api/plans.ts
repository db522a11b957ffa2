import { z } from 'zod';
import { draft, type draftRequest, type Draft } from '../../shared/contracts/api';
import { request } from './http';

const at = (production: string): string => `/api/productions/${encodeURIComponent(production)}/plans`;

export const listDrafts = (production: string): Promise<Draft[]> => request(at(production), z.array(draft));

export const readDraft = (production: string, plan: string): Promise<Draft> =>
  request(`${at(production)}/${encodeURIComponent(plan)}`, draft);

/** Keeps a plan made on this device; the server checks it again before it stores it. */
export const keepDraft = (production: string, body: z.input<typeof draftRequest>): Promise<Draft> =>
  request(at(production), draft, { method: 'POST', body });

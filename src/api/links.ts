import { z } from 'zod';
import { link, type Link, type linkRequest, newLink, type NewLink } from '../../shared/contracts/api';
import { request } from './http';

const at = (production: string): string => `/api/productions/${encodeURIComponent(production)}/links`;

export const listLinks = (production: string): Promise<Link[]> => request(at(production), z.array(link));

/** The address in the answer is shown once; the server keeps only its hash. */
export const createLink = (production: string, body: z.input<typeof linkRequest>): Promise<NewLink> =>
  request(at(production), newLink, { method: 'POST', body });

export const revokeLink = (production: string, id: string): Promise<unknown> =>
  request(`${at(production)}/${encodeURIComponent(id)}`, z.unknown(), { method: 'DELETE' });

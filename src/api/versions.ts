import { z } from 'zod';
import { publishedPlan, type PublishedPlan, type publishRequest, version, type Version } from '../../shared/contracts/api';
import { request } from './http';

const at = (production: string): string => `/api/productions/${encodeURIComponent(production)}/versions`;

export const listVersions = (production: string): Promise<Version[]> => request(at(production), z.array(version));

export const publish = (production: string, body: z.input<typeof publishRequest>): Promise<Version> =>
  request(at(production), version, { method: 'POST', body });

export const readVersion = (production: string, number: number): Promise<PublishedPlan> =>
  request(`${at(production)}/${number}`, publishedPlan);

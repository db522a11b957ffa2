import { z } from 'zod';
import {
  importResponse,
  type newProductionRequest,
  productionSummary,
  type ProductionSummary,
  snapshot,
  type Snapshot,
  startingPoint,
  type StartingPoint,
} from '../../shared/contracts/api';
import { request } from './http';

const created = z.object({ id: z.uuid() });
const at = (id: string): string => `/api/productions/${encodeURIComponent(id)}`;

export const listStartingPoints = (): Promise<StartingPoint[]> => request('/api/starting-points', z.array(startingPoint));

export const listProductions = (): Promise<ProductionSummary[]> => request('/api/productions', z.array(productionSummary));

export const createProduction = (body: z.input<typeof newProductionRequest>): Promise<{ id: string }> =>
  request('/api/productions', created, { method: 'POST', body });

export function importProduction(file: File): Promise<z.output<typeof importResponse>> {
  const form = new FormData();
  form.append('file', file);
  return request('/api/productions/import', importResponse, { method: 'POST', body: form });
}

/** All rows of a production, or only those newer than a revision. */
export const readProduction = (id: string, since?: number): Promise<Snapshot> =>
  request(since === undefined ? at(id) : `${at(id)}?since=${since}`, snapshot);

export const removeProduction = (id: string): Promise<unknown> => request(at(id), z.unknown(), { method: 'DELETE' });

/** Where the production file is downloaded. */
export const fileAddress = (id: string): string => `${at(id)}/file.yaml`;

import { changesResponse, type Change, type ChangesResponse } from '../../shared/contracts/changes';
import { request } from './http';

export const postChanges = (production: string, changes: Change[]): Promise<ChangesResponse> =>
  request(`/api/productions/${encodeURIComponent(production)}/changes`, changesResponse, { method: 'POST', body: { changes } });

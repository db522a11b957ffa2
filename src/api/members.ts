import { z } from 'zod';
import { member, type Member, type memberRequest, type memberUpdate, newMember, type NewMember } from '../../shared/contracts/api';
import { request } from './http';

const at = (production: string): string => `/api/productions/${encodeURIComponent(production)}/members`;

export const listMembers = (production: string): Promise<Member[]> => request(at(production), z.array(member));

/** Whoever has an account is a member at once; anybody else gets an address to be handed on, told this once. */
export const addMember = (production: string, body: z.input<typeof memberRequest>): Promise<NewMember> =>
  request(at(production), newMember, { method: 'POST', body });

export const updateMember = (production: string, id: string, body: z.input<typeof memberUpdate>): Promise<unknown> =>
  request(`${at(production)}/${encodeURIComponent(id)}`, z.unknown(), { method: 'PATCH', body });

export const removeMember = (production: string, id: string): Promise<unknown> =>
  request(`${at(production)}/${encodeURIComponent(id)}`, z.unknown(), { method: 'DELETE' });

/** Takes up an invitation; answers with the production it leads to. */
export const acceptInvitation = (token: string): Promise<{ id: string }> =>
  request('/api/invitations', z.object({ id: z.uuid() }), { method: 'POST', body: { token } });

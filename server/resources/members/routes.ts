import { invitationRequest, memberRequest, memberUpdate } from '../../../shared/contracts/api';
import type { Context } from '../../context';
import { perAddress } from '../../http/limits';
import type { Routes } from '../../http/routes';
import { acceptInvitation, addMember, listMembers, removeMember, updateMember } from './service';

const MEMBERS = '/api/productions/:production/members';

export function memberRoutes(routes: Routes, context: Context): void {
  routes.member('get', MEMBERS, 'readMembers', { run: ({ actor, member }) => listMembers(context, member, actor) });
  routes.member('post', MEMBERS, 'manageMembers', {
    body: memberRequest,
    status: 201,
    run: ({ actor, member, body }) => addMember(context, actor, member, body),
  });
  routes.member('patch', `${MEMBERS}/:member`, 'manageMembers', {
    body: memberUpdate,
    run: ({ actor, member, params, body }) => updateMember(context, actor, member, params.member, body),
  });
  routes.member('delete', `${MEMBERS}/:member`, 'manageMembers', {
    run: ({ member, params }) => removeMember(context, member, params.member),
  });
  routes.account('post', '/api/invitations', {
    before: [perAddress(context.config.signInLimit)],
    body: invitationRequest,
    run: ({ actor, body }) => acceptInvitation(context, actor, body.token),
  });
}

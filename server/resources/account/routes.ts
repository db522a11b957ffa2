import { accountRequest, passwordRequest } from '../../../shared/contracts/api';
import type { Context } from '../../context';
import { actorOf, endSessions, openSession } from '../../http/authenticate';
import { perAccount, perAddress } from '../../http/limits';
import type { Routes } from '../../http/routes';
import { presentSession } from '../session/presenter';
import { changePassword, createAccount } from './service';

export function accountRoutes(routes: Routes, context: Context): void {
  const { signInLimit } = context.config;
  routes.anyone('post', '/api/account', {
    before: [perAddress(signInLimit * 5), perAccount(signInLimit)],
    body: accountRequest,
    status: 201,
    run: async ({ body, request, response }) => {
      const actor = await actorOf(context, request);
      const user = await createAccount(context, actor, body);
      if (actor) await endSessions(context, actor.userId, { only: actor.sessionId });
      await openSession(context, request, response, user.id);
      return presentSession(context, request, user);
    },
  });
  routes.account('put', '/api/account/password', {
    before: [perAddress(signInLimit)],
    body: passwordRequest,
    run: ({ actor, body }) => changePassword(context, actor, body),
  });
}

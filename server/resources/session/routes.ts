import { signInRequest } from '../../../shared/contracts/api';
import type { Context } from '../../context';
import { actorOf, clearSession, endSessions, openSession } from '../../http/authenticate';
import { Refusal } from '../../http/errors';
import { perAccount, perAddress } from '../../http/limits';
import type { Routes } from '../../http/routes';
import { trialAllowed } from '../../http/trial';
import { keepTrial, signedInUser } from '../account/service';
import { presentSession } from './presenter';

export function sessionRoutes(routes: Routes, context: Context): void {
  const { config, db } = context;
  routes.anyone('get', '/api/session', {
    run: async ({ request }) => {
      const actor = await actorOf(context, request);
      return presentSession(context, request, actor && { ...actor, id: actor.userId });
    },
  });
  routes.anyone('post', '/api/session', {
    before: [perAddress(config.signInLimit * 5), perAccount(config.signInLimit)],
    body: signInRequest,
    run: async ({ body, request, response }) => {
      const user = await signedInUser(context, body);
      const before = await actorOf(context, request);
      if (before) {
        if (before.trial) await db.sequelize.transaction((transaction) => keepTrial(context, before, user.id, transaction));
        await endSessions(context, before.userId, { only: before.sessionId });
      }
      await openSession(context, request, response, user.id);
      return presentSession(context, request, user);
    },
  });
  routes.anyone('delete', '/api/session', {
    run: async ({ request, response }) => {
      const actor = await actorOf(context, request);
      if (actor) await endSessions(context, actor.userId, { only: actor.sessionId });
      clearSession(request, response);
    },
  });
  routes.anyone('post', '/api/session/trial', {
    before: [perAddress(config.newLimit)],
    status: 201,
    run: async ({ request, response }) => {
      if (!trialAllowed(config, request))
        throw new Refusal(
          'not-allowed',
          'A trial is open only on the machine that runs Redpoll, at http://localhost or http://127.0.0.1. Here, create an account or sign in.',
        );
      const actor = await actorOf(context, request);
      if (actor) return presentSession(context, request, { ...actor, id: actor.userId });
      const user = await db.users.create({ email: null, name: 'Trial', passwordHash: null });
      await openSession(context, request, response, user.id);
      return presentSession(context, request, user);
    },
  });
}

import { z } from 'zod';
import { changesRequest } from '../../../shared/contracts/changes';
import { resourceNames } from '../../../shared/contracts/resources';
import type { Context } from '../../context';
import type { Routes } from '../../http/routes';
import { readHistory } from './history';
import { applyChanges } from './service';

const historyQuery = z.object({ resource: z.enum(resourceNames).optional(), key: z.string().max(130).optional() });

export function changeRoutes(routes: Routes, context: Context): void {
  routes.member('post', '/api/productions/:production/changes', 'change', {
    bodyLimit: '4mb',
    body: changesRequest,
    run: ({ actor, member, body }) => applyChanges(context, { ...member, userId: actor.userId, name: actor.name }, body.changes),
  });
  routes.member('get', '/api/productions/:production/history', 'readHistory', {
    query: historyQuery,
    run: ({ member, query }) => readHistory(context, member, query),
  });
}

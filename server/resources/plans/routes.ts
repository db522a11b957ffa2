import { draftRequest, publishRequest } from '../../../shared/contracts/api';
import type { Context } from '../../context';
import type { Routes } from '../../http/routes';
import { listDrafts, readDraft, storeDraft } from './drafts';
import { listVersions, publish, readVersion } from './versions';

const PLANS = '/api/productions/:production/plans';
const VERSIONS = '/api/productions/:production/versions';

export function planRoutes(routes: Routes, context: Context): void {
  routes.member('get', PLANS, 'readDrafts', { run: ({ member }) => listDrafts(context, member) });
  routes.member('post', PLANS, 'plan', {
    body: draftRequest,
    bodyLimit: '4mb',
    status: 201,
    run: ({ actor, member, body }) => storeDraft(context, actor, member, body),
  });
  routes.member('get', `${PLANS}/:plan`, 'readDrafts', { run: ({ member, params }) => readDraft(context, member, params.plan) });
  routes.member('get', VERSIONS, 'readVersions', { run: ({ member }) => listVersions(context, member) });
  routes.member('post', VERSIONS, 'publish', {
    body: publishRequest,
    status: 201,
    run: ({ actor, member, body }) => publish(context, actor, member, body),
  });
  routes.member('get', `${VERSIONS}/:number`, 'readVersions', {
    run: ({ member, params }) => readVersion(context, member, params.number),
  });
}

import { linkRequest } from '../../../shared/contracts/api';
import type { Context } from '../../context';
import { originOf } from '../../http/origin';
import type { Routes } from '../../http/routes';
import { createLink, listLinks, revokeLink } from './service';

const LINKS = '/api/productions/:production/links';

export function linkRoutes(routes: Routes, context: Context): void {
  routes.member('get', LINKS, 'ownLinks', { run: ({ member }) => listLinks(context, member) });
  routes.member('post', LINKS, 'ownLinks', {
    body: linkRequest,
    status: 201,
    run: ({ actor, member, body, request }) => createLink(context, actor, member, body, originOf(request)),
  });
  routes.member('delete', `${LINKS}/:link`, 'ownLinks', { run: ({ member, params }) => revokeLink(context, member, params.link) });
}

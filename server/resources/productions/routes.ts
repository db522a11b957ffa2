import { z } from 'zod';
import { newProductionRequest } from '../../../shared/contracts/api';
import type { Context } from '../../context';
import { perAddress } from '../../http/limits';
import type { Routes } from '../../http/routes';
import { validate } from '../../http/validate';
import { production } from '../../../shared/contracts/head';
import { startingFile } from '../starting-points/service';
import { blankFile, createProduction, deleteProduction, exportOf, importProduction, listProductions, snapshotOf } from './service';
import { takeFile, textOf } from './upload';

const since = z.object({ since: z.coerce.number({ error: 'a revision' }).int().min(0).optional() });

const fileName = (code: string) => `${code.replaceAll(/[^\p{L}\p{N}_-]+/gu, '-').replaceAll(/^-+|-+$/g, '') || 'production'}.yaml`;

export function productionRoutes(routes: Routes, context: Context): void {
  const { newLimit } = context.config;
  routes.account('get', '/api/productions', { run: ({ actor }) => listProductions(context, actor) });
  routes.account('post', '/api/productions', {
    before: [perAddress(newLimit)],
    body: newProductionRequest,
    status: 201,
    run: async ({ actor, body }) => {
      const file = 'from' in body ? await startingFile(context, body.from) : blankFile(validate(production, body, 'The production'));
      return createProduction(context, actor, file);
    },
  });
  routes.account('post', '/api/productions/import', {
    before: [perAddress(newLimit), takeFile()],
    status: 201,
    run: ({ actor, request }) => importProduction(context, actor, textOf(request.file)),
  });
  routes.member('get', '/api/productions/:production', 'read', {
    query: since,
    run: ({ member, query }) => snapshotOf(context, member, query.since),
  });
  routes.member('delete', '/api/productions/:production', 'remove', {
    run: ({ member }) => deleteProduction(context, member.productionId),
  });
  routes.member('get', '/api/productions/:production/file.yaml', 'export', {
    run: ({ member }) => exportOf(context, member),
    send: (response, { code, source }) => {
      response.attachment(fileName(code)).type('application/yaml; charset=utf-8').send(source);
    },
  });
}

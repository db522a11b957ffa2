import type { Context } from '../../context';
import type { Routes } from '../../http/routes';

export function healthRoutes(routes: Routes, { db }: Context): void {
  routes.anyone('get', '/api/health', {
    run: async () => {
      await db.sequelize.query('select 1');
      return { ok: true };
    },
  });
}

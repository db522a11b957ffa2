import type { Context } from '../../context';
import type { Routes } from '../../http/routes';
import { listStartingPoints } from './service';

export function startingPointRoutes(routes: Routes, context: Context): void {
  routes.anyone('get', '/api/starting-points', { run: () => listStartingPoints(context) });
}

import type { Context } from '../context';
import type { Routes } from '../http/routes';
import { accountRoutes } from './account/routes';
import { calendarRoutes } from './calendar/routes';
import { changeRoutes } from './changes/routes';
import { healthRoutes } from './health/routes';
import { linkRoutes } from './links/routes';
import { memberRoutes } from './members/routes';
import { planRoutes } from './plans/routes';
import { productionRoutes } from './productions/routes';
import { sessionRoutes } from './session/routes';
import { sheetRoutes } from './sheets/routes';
import { startingPointRoutes } from './starting-points/routes';

/** Every resource that opens addresses; each writes its paths out in full. */
export const resources: readonly ((routes: Routes, context: Context) => void)[] = [
  healthRoutes,
  sessionRoutes,
  accountRoutes,
  startingPointRoutes,
  productionRoutes,
  changeRoutes,
  planRoutes,
  memberRoutes,
  sheetRoutes,
  linkRoutes,
  calendarRoutes,
];

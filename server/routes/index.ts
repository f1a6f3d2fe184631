import type { Api } from '../http/api.ts';
import { readingImportRoutes } from './reading-import-routes.ts';
import { readingRoutes } from './reading-routes.ts';
import { reservoirRoutes } from './reservoir-routes.ts';
import { systemRoutes } from './system-routes.ts';
import { timelineRoutes } from './timeline-routes.ts';
import { waterRoutes } from './water-routes.ts';
import { listingRoutes } from './listing-routes.ts';
import { orderRoutes } from './order-routes.ts';
import { paymentRoutes } from './payment-routes.ts';
import { shopRoutes } from './shop-routes.ts';
import { storeRoutes } from './store-routes.ts';
import { labelRoutes } from './label-routes.ts';
import { publicRoutes } from './public-routes.ts';
import { accountRoutes } from './account-routes.ts';
import { auditRoutes } from './audit-routes.ts';
import { farmRoutes } from './farm-routes.ts';
import { peopleRoutes } from './people-routes.ts';
import { todayRoutes } from './today-routes.ts';
import { sessionRoutes } from './session-routes.ts';
import { stockRoutes } from './stock-routes.ts';
import { costRoutes } from './cost-routes.ts';
import { supplyRoutes } from './supply-routes.ts';

/** Every resource's routes, in one list. */
export function registerRoutes(api: Api): void {
  labelRoutes(api);
  publicRoutes(api);
  sessionRoutes(api);
  stockRoutes(api);
  supplyRoutes(api);
  costRoutes(api);
  storeRoutes(api);
  listingRoutes(api);
  orderRoutes(api);
  shopRoutes(api);
  paymentRoutes(api);
  accountRoutes(api);
  peopleRoutes(api);
  farmRoutes(api);
  auditRoutes(api);
  todayRoutes(api);
  waterRoutes(api);
  timelineRoutes(api);
  systemRoutes(api);
  reservoirRoutes(api);
  readingRoutes(api);
  readingImportRoutes(api);
}

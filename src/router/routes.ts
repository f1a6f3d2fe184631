import type { RouteRecordRaw } from 'vue-router';
import { accountRoutes } from '@/router/areas/account.ts';
import { costsRoutes } from '@/router/areas/costs.ts';
import { cuttingRoutes } from '@/router/areas/cutting.ts';
import { ordersRoutes } from '@/router/areas/orders.ts';
import { planRoutes } from '@/router/areas/plan.ts';
import { scanRoutes } from '@/router/areas/scan.ts';
import { settingsRoutes } from '@/router/areas/settings.ts';
import { shopRoutes } from '@/router/areas/shop.ts';
import { stockRoutes } from '@/router/areas/stock.ts';
import { suppliesRoutes } from '@/router/areas/supplies.ts';
import { todayRoutes } from '@/router/areas/today.ts';
import { waterRoutes } from '@/router/areas/water.ts';

export const routes: RouteRecordRaw[] = [
  // The guard sends the person on to the first place that they may use.
  { path: '/', name: 'home', component: () => import('@/views/account/NotFoundView.vue') },
  ...todayRoutes,
  ...waterRoutes,
  ...stockRoutes,
  ...cuttingRoutes,
  ...suppliesRoutes,
  ...ordersRoutes,
  ...costsRoutes,
  ...planRoutes,
  ...settingsRoutes,
  ...shopRoutes,
  ...scanRoutes,
  ...accountRoutes,
  {
    path: '/no-permission',
    name: 'no-permission',
    component: () => import('@/views/account/NoPermissionView.vue'),
    meta: { title: 'Not open to you', access: 'public' },
  },
  {
    path: '/:path(.*)*',
    name: 'not-found',
    component: () => import('@/views/account/NotFoundView.vue'),
    meta: { title: 'Page not found', access: 'public' },
  },
];

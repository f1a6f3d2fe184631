import type { RouteRecordRaw } from 'vue-router';

export const costsRoutes: RouteRecordRaw[] = [
  {
    path: '/costs',
    name: 'costs',
    component: () => import('@/views/costs/CostsView.vue'),
    meta: { title: 'Costs', access: 'costs.read', place: 'costs' },
  },
];

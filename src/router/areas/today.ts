import type { RouteRecordRaw } from 'vue-router';

export const todayRoutes: RouteRecordRaw[] = [
  {
    path: '/today',
    name: 'today',
    component: () => import('@/views/today/TodayView.vue'),
    meta: { title: 'Today', access: 'today.read', place: 'today' },
  },
];

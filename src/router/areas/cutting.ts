import type { RouteRecordRaw } from 'vue-router';

export const cuttingRoutes: RouteRecordRaw[] = [
  {
    path: '/cutting',
    name: 'cutting',
    component: () => import('@/views/cutting/CuttingView.vue'),
    meta: { title: 'Cutting', access: 'stock.work', place: 'cutting' },
  },
  {
    path: '/cutting/log',
    name: 'log-cut',
    component: () => import('@/views/cutting/LogCutView.vue'),
    props: ({ query }) => ({ colonyId: textOf(query.colonyId), lineId: textOf(query.lineId) }),
    meta: { title: 'Log a cut', access: 'stock.work', place: 'cutting' },
  },
];

function textOf(value: unknown): string | undefined {
  return typeof value === 'string' ? value : undefined;
}

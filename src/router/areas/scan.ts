import type { RouteRecordRaw } from 'vue-router';
import { useSessionStore } from '@/stores/session.ts';

export const scanRoutes: RouteRecordRaw[] = [
  {
    path: '/scan',
    name: 'scan',
    component: () => import('@/views/scan/ScanView.vue'),
    meta: { title: 'Scan', access: 'stock.read', place: 'scan' },
  },
  {
    // What a plug's label leads to; labels hold it in capitals, which match all the same.
    path: '/p/:code',
    name: 'plug-address',
    component: () => import('@/views/public/PublicPlugView.vue'),
    props: true,
    beforeEnter: ({ params }) =>
      useSessionStore().can('stock.read') ? { name: 'plug', params: { code: params.code ?? '' }, replace: true } : true,
    meta: { title: 'Coral', access: 'public', layout: 'plain' },
  },
  {
    path: '/r/:code',
    name: 'rack-address',
    component: () => import('@/views/scan/RackAddressView.vue'),
    props: true,
    meta: { title: 'Rack', access: 'stock.read', place: 'stock' },
  },
  {
    path: '/labels',
    name: 'labels',
    component: () => import('@/views/stock/LabelSheetView.vue'),
    meta: { title: 'Labels', access: 'stock.label', place: 'stock' },
  },
];

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
    path: '/t/:code',
    name: 'tank-address',
    component: () => import('@/views/scan/TankAddressView.vue'),
    props: true,
    meta: { title: 'Tank', access: 'stock.read', place: 'water' },
  },
  {
    path: '/b/:code',
    name: 'box-address',
    component: () => import('@/views/scan/BoxAddressView.vue'),
    props: true,
    meta: { title: 'Box', access: 'orders.read', place: 'orders' },
  },
  {
    path: '/labels',
    name: 'labels',
    component: () => import('@/views/stock/LabelSheetView.vue'),
    meta: { title: 'Labels', access: 'stock.label', place: 'stock' },
  },
  {
    path: '/labels/stocks',
    name: 'label-stocks',
    component: () => import('@/views/stock/LabelStocksView.vue'),
    meta: { title: 'Label stocks', access: 'stock.label', place: 'stock' },
  },
  {
    path: '/labels/stocks/new',
    name: 'label-stock-new',
    component: () => import('@/views/stock/LabelStockNewView.vue'),
    meta: { title: 'Add a label stock', access: 'stock.label', place: 'stock' },
  },
  {
    path: '/labels/stocks/:stockId',
    name: 'label-stock',
    component: () => import('@/views/stock/LabelStockView.vue'),
    props: true,
    meta: { title: 'Label stock', access: 'stock.label', place: 'stock' },
  },
  {
    path: '/labels/stocks/:stockId/printers',
    name: 'label-fit',
    component: () => import('@/views/stock/LabelFitView.vue'),
    props: true,
    meta: { title: 'Measure a printer', access: 'stock.label', place: 'stock' },
  },
];

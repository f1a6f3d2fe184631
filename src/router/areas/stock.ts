import type { RouteRecordRaw } from 'vue-router';

export const stockRoutes: RouteRecordRaw[] = [
  {
    path: '/stock',
    name: 'stock',
    component: () => import('@/views/stock/StockView.vue'),
    meta: { title: 'Stock', access: 'stock.read', place: 'stock' },
  },
  {
    path: '/stock/lines/new',
    name: 'line-new',
    component: () => import('@/views/stock/LineFormView.vue'),
    meta: { title: 'New line', access: 'stock.work', place: 'stock' },
  },
  {
    path: '/stock/lines/:id',
    name: 'line',
    component: () => import('@/views/stock/LineView.vue'),
    props: true,
    meta: { title: 'Line', access: 'stock.read', place: 'stock' },
  },
  {
    path: '/stock/lines/:id/edit',
    name: 'line-edit',
    component: () => import('@/views/stock/LineFormView.vue'),
    props: true,
    meta: { title: 'Edit line', access: 'stock.work', place: 'stock' },
  },
  {
    path: '/stock/mothers/:id',
    name: 'colony',
    component: () => import('@/views/stock/ColonyView.vue'),
    props: true,
    meta: { title: 'Mother', access: 'stock.read', place: 'stock' },
  },
  {
    path: '/stock/batches',
    name: 'batches',
    component: () => import('@/views/stock/BatchListView.vue'),
    meta: { title: 'Batches', access: 'stock.read', place: 'stock' },
  },
  {
    path: '/stock/batches/:id',
    name: 'batch',
    component: () => import('@/views/stock/BatchView.vue'),
    props: true,
    meta: { title: 'Batch', access: 'stock.read', place: 'stock' },
  },
  {
    path: '/stock/plugs/:code',
    name: 'plug',
    component: () => import('@/views/stock/PlugView.vue'),
    props: true,
    meta: { title: 'Plug', access: 'stock.read', place: 'stock' },
  },
  {
    path: '/stock/survivors',
    name: 'survival',
    component: () => import('@/views/stock/SurvivalView.vue'),
    meta: { title: 'Survivors', access: 'stock.read', place: 'stock' },
  },
  {
    path: '/stock/racks',
    name: 'racks',
    component: () => import('@/views/stock/RackListView.vue'),
    meta: { title: 'Racks', access: 'stock.read', place: 'stock' },
  },
  {
    path: '/stock/racks/:id',
    name: 'rack',
    component: () => import('@/views/stock/RackView.vue'),
    props: true,
    meta: { title: 'Rack', access: 'stock.read', place: 'stock' },
  },
];

import type { RouteRecordRaw } from 'vue-router';

export const suppliesRoutes: RouteRecordRaw[] = [
  {
    path: '/supplies',
    name: 'supplies',
    component: () => import('@/views/supplies/SuppliesView.vue'),
    meta: { title: 'Supplies', access: 'supplies.read', place: 'supplies' },
  },
  {
    path: '/supplies/receive',
    name: 'supply-receive',
    component: () => import('@/views/supplies/ReceiveView.vue'),
    meta: { title: 'Receive a delivery', access: 'supplies.work', place: 'supplies' },
  },
  {
    path: '/supplies/new',
    name: 'supply-new',
    component: () => import('@/views/supplies/ItemFormView.vue'),
    meta: { title: 'Add a supply', access: 'supplies.work', place: 'supplies' },
  },
  {
    path: '/supplies/:id',
    name: 'supply',
    component: () => import('@/views/supplies/ItemView.vue'),
    props: true,
    meta: { title: 'Supply', access: 'supplies.read', place: 'supplies' },
  },
  {
    path: '/supplies/:id/edit',
    name: 'supply-edit',
    component: () => import('@/views/supplies/ItemFormView.vue'),
    props: true,
    meta: { title: 'Change a supply', access: 'supplies.work', place: 'supplies' },
  },
];

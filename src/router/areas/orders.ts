import type { RouteRecordRaw } from 'vue-router';

export const ordersRoutes: RouteRecordRaw[] = [
  {
    path: '/orders',
    name: 'orders',
    component: () => import('@/views/orders/OrdersView.vue'),
    meta: { title: 'Orders', access: 'orders.read', place: 'orders' },
  },
  {
    path: '/orders/:id',
    name: 'order',
    component: () => import('@/views/orders/OrderView.vue'),
    props: true,
    meta: { title: 'Order', access: 'orders.read', place: 'orders' },
  },
  {
    path: '/orders/:id/pick',
    name: 'order-pick',
    component: () => import('@/views/orders/PickView.vue'),
    props: true,
    meta: { title: 'Pick an order', access: 'orders.work', place: 'orders' },
  },
  {
    path: '/stores',
    name: 'stores',
    component: () => import('@/views/orders/StoresView.vue'),
    meta: { title: 'Stores', access: 'stores.read', place: 'orders' },
  },
  {
    path: '/stores/:id',
    name: 'store',
    component: () => import('@/views/orders/StoreView.vue'),
    props: true,
    meta: { title: 'Store', access: 'stores.read', place: 'orders' },
  },
  {
    path: '/listings',
    name: 'listings',
    component: () => import('@/views/orders/ListingsView.vue'),
    meta: { title: 'Offers and prices', access: 'listings.read', place: 'orders' },
  },
];

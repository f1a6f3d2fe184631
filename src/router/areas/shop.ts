import type { RouteRecordRaw } from 'vue-router';

export const shopRoutes: RouteRecordRaw[] = [
  {
    path: '/shop',
    name: 'shop',
    component: () => import('@/views/shop/AvailabilityView.vue'),
    meta: { title: 'Availability', access: 'shop.read', place: 'shop' },
  },
  {
    path: '/shop/checkout',
    name: 'shop-checkout',
    component: () => import('@/views/shop/CheckoutView.vue'),
    meta: { title: 'Your order', access: 'shop.order', place: 'shop' },
  },
  {
    path: '/shop/orders',
    name: 'shop-orders',
    component: () => import('@/views/shop/ShopOrdersView.vue'),
    meta: { title: 'Orders', access: 'shop.read', place: 'shop-orders' },
  },
  {
    path: '/shop/orders/:id',
    name: 'shop-order',
    component: () => import('@/views/shop/ShopOrderView.vue'),
    props: true,
    meta: { title: 'Order', access: 'shop.read', place: 'shop-orders' },
  },
];

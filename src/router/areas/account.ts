import type { RouteRecordRaw } from 'vue-router';

export const accountRoutes: RouteRecordRaw[] = [
  {
    path: '/sign-in',
    name: 'sign-in',
    component: () => import('@/views/account/SignInView.vue'),
    meta: { title: 'Sign in', access: 'public', layout: 'plain' },
  },
  {
    path: '/set-up',
    name: 'set-up',
    component: () => import('@/views/account/SetUpView.vue'),
    meta: { title: 'Set up the farm', access: 'public', layout: 'plain' },
  },
  {
    path: '/reset-password',
    name: 'request-reset',
    component: () => import('@/views/account/RequestResetView.vue'),
    meta: { title: 'Forgotten password', access: 'public', layout: 'plain' },
  },
  {
    path: '/reset-password/:token',
    name: 'reset-password',
    component: () => import('@/views/account/ResetPasswordView.vue'),
    props: true,
    meta: { title: 'New password', access: 'public', layout: 'plain' },
  },
  {
    path: '/invitation/:token',
    name: 'accept-invitation',
    component: () => import('@/views/account/AcceptInvitationView.vue'),
    props: true,
    meta: { title: 'Invitation', access: 'public', layout: 'plain' },
  },
  {
    path: '/account',
    name: 'account',
    component: () => import('@/views/account/AccountView.vue'),
    meta: { title: 'Your account', access: 'account.own' },
  },
];

import type { RouteRecordRaw } from 'vue-router';

export const settingsRoutes: RouteRecordRaw[] = [
  {
    path: '/settings',
    name: 'settings',
    component: () => import('@/views/settings/SettingsView.vue'),
    meta: { title: 'Settings', access: 'audit.read', place: 'settings' },
  },
  {
    path: '/settings/farm',
    name: 'farm-settings',
    component: () => import('@/views/settings/FarmSettingsView.vue'),
    meta: { title: 'Farm', access: 'farm.configure', place: 'settings' },
  },
  {
    path: '/settings/people',
    name: 'people',
    component: () => import('@/views/settings/PeopleView.vue'),
    meta: { title: 'People', access: 'people.manage', place: 'settings' },
  },
  {
    path: '/settings/water-rules',
    name: 'water-rules',
    component: () => import('@/views/settings/WaterRulesView.vue'),
    meta: { title: 'Water rules', access: 'water.read', place: 'settings' },
  },
  {
    path: '/settings/audit-log',
    name: 'audit-log',
    component: () => import('@/views/settings/AuditLogView.vue'),
    meta: { title: 'Audit log', access: 'audit.read', place: 'settings' },
  },
];

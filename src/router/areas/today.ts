import type { RouteRecordRaw } from 'vue-router';

export const todayRoutes: RouteRecordRaw[] = [
  {
    path: '/today',
    name: 'today',
    component: () => import('@/views/today/TodayView.vue'),
    meta: { title: 'Today', access: 'today.read', place: 'today' },
  },
  {
    path: '/tasks',
    name: 'tasks',
    component: () => import('@/views/tasks/TasksView.vue'),
    props: ({ query }) => ({ taskId: query.task }),
    meta: { title: 'Tasks', access: 'water.read', place: 'today' },
  },
  {
    path: '/alerts',
    name: 'alerts',
    component: () => import('@/views/alerts/AlertsView.vue'),
    meta: { title: 'Alerts', access: 'water.read', place: 'water' },
  },
];

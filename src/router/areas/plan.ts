import type { RouteRecordRaw } from 'vue-router';

export const planRoutes: RouteRecordRaw[] = [];

import type { RouteRecordRaw } from 'vue-router';

export const todayRoutes: RouteRecordRaw[] = [];

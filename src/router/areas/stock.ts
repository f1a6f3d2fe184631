import type { RouteRecordRaw } from 'vue-router';

export const stockRoutes: RouteRecordRaw[] = [];

import type { RouteRecordRaw } from 'vue-router';

export const suppliesRoutes: RouteRecordRaw[] = [];

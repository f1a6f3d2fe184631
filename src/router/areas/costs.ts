import type { RouteRecordRaw } from 'vue-router';

export const costsRoutes: RouteRecordRaw[] = [];

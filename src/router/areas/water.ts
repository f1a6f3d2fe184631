import type { RouteRecordRaw } from 'vue-router';

export const waterRoutes: RouteRecordRaw[] = [];

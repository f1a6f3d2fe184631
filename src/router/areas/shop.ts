import type { RouteRecordRaw } from 'vue-router';

export const shopRoutes: RouteRecordRaw[] = [];

import type { RouteRecordRaw } from 'vue-router';

export const cuttingRoutes: RouteRecordRaw[] = [];

import type { RouteRecordRaw } from 'vue-router';

export const scanRoutes: RouteRecordRaw[] = [];

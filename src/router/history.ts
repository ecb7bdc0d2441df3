import { type RouteRecordRaw } from 'vue-router';

export const historyRoutes: RouteRecordRaw[] = [];

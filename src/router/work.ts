import { type RouteRecordRaw } from 'vue-router';

export const workRoutes: RouteRecordRaw[] = [];

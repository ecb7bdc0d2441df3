import { type RouteRecordRaw } from 'vue-router';

export const benchesRoutes: RouteRecordRaw[] = [];

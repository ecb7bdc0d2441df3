import { type RouteRecordRaw } from 'vue-router';

export const receiversRoutes: RouteRecordRaw[] = [];

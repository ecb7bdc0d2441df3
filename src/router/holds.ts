import { type RouteRecordRaw } from 'vue-router';

export const holdsRoutes: RouteRecordRaw[] = [];

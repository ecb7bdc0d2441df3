import { type RouteRecordRaw } from 'vue-router';

export const partsRoutes: RouteRecordRaw[] = [];

import { type RouteRecordRaw } from 'vue-router';

export const peopleRoutes: RouteRecordRaw[] = [];

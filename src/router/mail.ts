import { type RouteRecordRaw } from 'vue-router';

export const mailRoutes: RouteRecordRaw[] = [];

import { type RouteRecordRaw } from 'vue-router';

export const suppliersRoutes: RouteRecordRaw[] = [];

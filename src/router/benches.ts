import { type RouteRecordRaw } from 'vue-router';
import { houseRoles } from '@shared/contract/common';

export const benchesRoutes: RouteRecordRaw[] = [
  {
    path: '/benches',
    name: 'benches',
    component: () => import('@/views/benches/BenchesPage.vue'),
    meta: { title: 'benches.title', roles: houseRoles },
  },
  {
    path: '/benches/new',
    name: 'benches-new',
    component: () => import('@/views/benches/AddBenchPage.vue'),
    meta: { title: 'benches.add', roles: ['administrator'] },
  },
  {
    path: '/benches/:id',
    name: 'benches-one',
    component: () => import('@/views/benches/BenchPage.vue'),
    props: true,
    meta: { title: 'benches.title', roles: houseRoles },
  },
  {
    path: '/benches/:id/change',
    name: 'benches-change',
    component: () => import('@/views/benches/ChangeBenchPage.vue'),
    props: true,
    meta: { title: 'benches.change', roles: ['administrator'] },
  },
];

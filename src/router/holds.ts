import { type RouteRecordRaw } from 'vue-router';

const roles = [
  'technician',
  'quality_engineer',
  'supplier_contact',
  'auditor',
  'administrator',
] as const;

export const holdsRoutes: RouteRecordRaw[] = [
  {
    path: '/holds',
    name: 'holds',
    component: () => import('@/views/holds/HoldsPage.vue'),
    meta: { title: 'holds.title', roles },
  },
  {
    path: '/holds/:id',
    name: 'holds-one',
    component: () => import('@/views/holds/HoldPage.vue'),
    props: true,
    meta: { title: 'holds.number', roles },
  },
];

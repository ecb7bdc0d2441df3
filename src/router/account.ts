import { type RouteRecordRaw } from 'vue-router';

export const accountRoutes: RouteRecordRaw[] = [
  {
    path: '/account',
    name: 'account',
    component: () => import('@/views/account/AccountPage.vue'),
    meta: { title: 'account.title' },
  },
];

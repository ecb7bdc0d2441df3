import { type RouteRecordRaw } from 'vue-router';

export const workRoutes: RouteRecordRaw[] = [
  {
    path: '/',
    name: 'work',
    component: () => import('@/views/work/WorkPage.vue'),
    meta: { title: 'work.title' },
  },
];

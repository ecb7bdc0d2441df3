import { type RouteRecordRaw } from 'vue-router';

export const keysRoutes: RouteRecordRaw[] = [
  {
    path: '/keys',
    name: 'keys',
    component: () => import('@/views/keys/KeysPage.vue'),
    meta: { title: 'frame.keys.title' },
  },
];

import { type RouteRecordRaw } from 'vue-router';
import { type Role } from '@/stores/session';

const roles: readonly Role[] = ['administrator'];

export const peopleRoutes: RouteRecordRaw[] = [
  {
    path: '/people',
    name: 'people',
    component: () => import('@/views/people/PeoplePage.vue'),
    meta: { title: 'people.title', roles },
  },
  {
    path: '/people/new',
    name: 'people-new',
    component: () => import('@/views/people/InvitePersonPage.vue'),
    meta: { title: 'people.invite', roles },
  },
  {
    path: '/people/:id',
    name: 'people-one',
    component: () => import('@/views/people/PersonPage.vue'),
    props: true,
    meta: { title: 'people.title', roles },
  },
];

import { createRouter, createWebHistory, type RouteRecordRaw } from 'vue-router';
import './meta';
import { guard } from './guard';
import { authRoutes } from './auth';
import { accountRoutes } from './account';
import { workRoutes } from './work';
import { lotsRoutes } from './lots';
import { holdsRoutes } from './holds';
import { partsRoutes } from './parts';
import { receiversRoutes } from './receivers';
import { suppliersRoutes } from './suppliers';
import { benchesRoutes } from './benches';
import { peopleRoutes } from './people';
import { historyRoutes } from './history';
import { mailRoutes } from './mail';
import { keysRoutes } from './keys';

const development: RouteRecordRaw[] = import.meta.env.DEV
  ? [
      {
        path: '/specimen',
        name: 'specimen',
        component: () => import('@/specimen/SpecimenPage.vue'),
        meta: { title: 'Specimen', roles: 'anyone', layout: 'print' },
      },
      {
        path: '/specimen/framed',
        name: 'specimen-framed',
        component: () => import('@/specimen/SpecimenPage.vue'),
        meta: { title: 'Specimen', section: 'lots' },
      },
    ]
  : [];

export function makeRouter() {
  const router = createRouter({
    history: createWebHistory(),
    routes: [
      ...authRoutes,
      ...accountRoutes,
      ...workRoutes,
      ...lotsRoutes,
      ...holdsRoutes,
      ...partsRoutes,
      ...receiversRoutes,
      ...suppliersRoutes,
      ...benchesRoutes,
      ...peopleRoutes,
      ...historyRoutes,
      ...mailRoutes,
      ...keysRoutes,
      ...development,
      {
        path: '/:rest(.*)*',
        name: 'missing',
        component: () => import('@/views/MissingPage.vue'),
        meta: { title: 'frame.missing.title', roles: 'anyone' },
      },
    ],
    scrollBehavior: (to, from, kept) => {
      if (kept) return kept;
      if (to.hash) return { el: to.hash };
      return to.path === from.path ? false : { top: 0 };
    },
  });
  guard(router);
  return router;
}

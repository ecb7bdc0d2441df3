import { type RouteRecordRaw } from 'vue-router';
import { houseRoles } from '@shared/contract/common';

export const partsRoutes: RouteRecordRaw[] = [
  {
    path: '/parts',
    name: 'parts',
    component: () => import('@/views/parts/PartsPage.vue'),
    meta: { title: 'parts.title', roles: houseRoles },
  },
  {
    path: '/parts/new',
    name: 'parts-new',
    component: () => import('@/views/parts/AddPartPage.vue'),
    meta: { title: 'parts.addTitle', roles: ['administrator'] },
  },
  {
    path: '/parts/:id',
    name: 'parts-one',
    component: () => import('@/views/parts/PartPage.vue'),
    props: true,
    meta: { title: 'parts.title', roles: houseRoles },
  },
  {
    path: '/parts/:id/change',
    name: 'parts-change',
    component: () => import('@/views/parts/ChangePartPage.vue'),
    props: true,
    meta: { title: 'parts.change', roles: ['administrator'] },
  },
  {
    path: '/parts/:id/revisions/new',
    name: 'parts-revision-new',
    component: () => import('@/views/parts/DraftPartRevisionPage.vue'),
    props: true,
    meta: { title: 'criteria.draftNext', roles: ['administrator'] },
  },
  {
    path: '/parts/:id/revisions/:revisionId',
    name: 'parts-revision',
    component: () => import('@/views/parts/PartRevisionPage.vue'),
    props: true,
    meta: { title: 'criteria.revision', roles: houseRoles },
  },
  {
    path: '/parts/:id/revisions/:revisionId/change',
    name: 'parts-revision-change',
    component: () => import('@/views/parts/ChangePartRevisionPage.vue'),
    props: true,
    meta: { title: 'criteria.changeDraft', roles: ['administrator'] },
  },
];

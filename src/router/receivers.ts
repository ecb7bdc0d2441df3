import { type RouteRecordRaw } from 'vue-router';
import { houseRoles } from '@shared/contract/common';

export const receiversRoutes: RouteRecordRaw[] = [
  {
    path: '/receivers',
    name: 'receivers',
    component: () => import('@/views/receivers/ReceiversPage.vue'),
    meta: { title: 'receivers.title', roles: houseRoles },
  },
  {
    path: '/receivers/new',
    name: 'receivers-new',
    component: () => import('@/views/receivers/AddReceiverPage.vue'),
    meta: { title: 'receivers.addTitle', roles: ['administrator'] },
  },
  {
    path: '/receivers/:id',
    name: 'receivers-one',
    component: () => import('@/views/receivers/ReceiverPage.vue'),
    props: true,
    meta: { title: 'receivers.title', roles: houseRoles },
  },
  {
    path: '/receivers/:id/change',
    name: 'receivers-change',
    component: () => import('@/views/receivers/ChangeReceiverPage.vue'),
    props: true,
    meta: { title: 'receivers.change', roles: ['administrator'] },
  },
  {
    path: '/receivers/:id/revisions/new',
    name: 'receivers-revision-new',
    component: () => import('@/views/receivers/DraftReceiverRevisionPage.vue'),
    props: true,
    meta: { title: 'criteria.draftNext', roles: ['administrator'] },
  },
  {
    path: '/receivers/:id/revisions/:revisionId',
    name: 'receivers-revision',
    component: () => import('@/views/receivers/ReceiverRevisionPage.vue'),
    props: true,
    meta: { title: 'criteria.revision', roles: houseRoles },
  },
  {
    path: '/receivers/:id/revisions/:revisionId/change',
    name: 'receivers-revision-change',
    component: () => import('@/views/receivers/ChangeReceiverRevisionPage.vue'),
    props: true,
    meta: { title: 'criteria.changeDraft', roles: ['administrator'] },
  },
];

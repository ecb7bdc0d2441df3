import { type RouteRecordRaw } from 'vue-router';
import { houseRoles } from '@shared/contract/common';

export const lotsRoutes: RouteRecordRaw[] = [
  {
    path: '/lots',
    name: 'lots',
    component: () => import('@/views/lots/LotsPage.vue'),
    meta: { title: 'lots.list.title', roles: houseRoles },
  },
  {
    path: '/lots/new',
    name: 'lots-new',
    component: () => import('@/views/lots/RegisterLotPage.vue'),
    meta: { title: 'lots.register.title', roles: ['technician', 'quality_engineer'] },
  },
  {
    path: '/lots/:id/upload',
    name: 'lot-upload',
    component: () => import('@/views/lots/UploadPage.vue'),
    meta: { title: 'upload.choose', roles: ['technician', 'quality_engineer'], section: 'lots' },
  },
  {
    path: '/lots/:id',
    name: 'lot',
    component: () => import('@/views/lots/LotPage.vue'),
    props: true,
    meta: {
      title: 'frame.section.lots',
      section: 'lots',
      roles: ['technician', 'quality_engineer', 'auditor', 'administrator'],
    },
  },
];

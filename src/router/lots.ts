import { type RouteRecordRaw } from 'vue-router';

export const lotsRoutes: RouteRecordRaw[] = [
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

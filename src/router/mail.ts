import { type RouteRecordRaw } from 'vue-router';

const roles = ['administrator', 'quality_engineer', 'auditor'] as const;

export const mailRoutes: RouteRecordRaw[] = [
  {
    path: '/mail',
    name: 'mail',
    component: () => import('@/views/mail/MailListPage.vue'),
    meta: { title: 'mail.title', roles },
  },
  {
    path: '/mail/:id',
    name: 'mail-one',
    component: () => import('@/views/mail/MailPage.vue'),
    props: true,
    meta: { title: 'mail.title', roles },
  },
];

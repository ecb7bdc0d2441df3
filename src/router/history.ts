import { type RouteRecordRaw } from 'vue-router';

const roles = ['auditor', 'quality_engineer', 'administrator'] as const;

export const historyRoutes: RouteRecordRaw[] = [
  {
    path: '/history',
    name: 'history',
    component: () => import('@/views/history/HistoryPage.vue'),
    meta: { title: 'history.title', roles },
  },
  {
    path: '/history/checkpoints',
    name: 'history-checkpoints',
    component: () => import('@/views/history/CheckpointsPage.vue'),
    meta: { title: 'history.checkpoints.title', roles },
  },
  {
    path: '/history/records/:recordType/:recordId',
    name: 'history-record',
    component: () => import('@/views/history/RecordPage.vue'),
    props: true,
    meta: { title: 'history.title', roles },
  },
  {
    path: '/history/:sequence(\\d+)',
    name: 'history-entry',
    component: () => import('@/views/history/EntryPage.vue'),
    props: ({ params }) => ({ sequence: Number(params.sequence) }),
    meta: { title: 'history.title', roles },
  },
];

import { type RouteRecordRaw } from 'vue-router';
import { houseRoles } from '@shared/contract/common';

export const suppliersRoutes: RouteRecordRaw[] = [
  {
    path: '/suppliers',
    name: 'suppliers',
    component: () => import('@/views/suppliers/SuppliersPage.vue'),
    meta: { title: 'suppliers.title', roles: houseRoles },
  },
  {
    path: '/suppliers/new',
    name: 'suppliers-new',
    component: () => import('@/views/suppliers/AddSupplierPage.vue'),
    meta: { title: 'suppliers.add', roles: ['administrator'] },
  },
  {
    path: '/suppliers/:id',
    name: 'suppliers-one',
    component: () => import('@/views/suppliers/SupplierPage.vue'),
    props: true,
    meta: { title: 'suppliers.title', roles: houseRoles },
  },
  {
    path: '/suppliers/:id/change',
    name: 'suppliers-change',
    component: () => import('@/views/suppliers/ChangeSupplierPage.vue'),
    props: true,
    meta: { title: 'suppliers.change', roles: ['administrator'] },
  },
];

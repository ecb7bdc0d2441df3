import { type RouteRecordRaw } from 'vue-router';
import { useSession } from '@/stores/session';
import { safeNext } from './guard';

/** Who is signed in has no business at the sign-in page. An unreachable server is told there, when one tries. */
async function onlySignedOut(to: { query: { next?: unknown } }): Promise<string | true> {
  const session = useSession();
  await session.load().catch(() => undefined);
  return session.person === null ? true : safeNext(to.query.next);
}

export const authRoutes: RouteRecordRaw[] = [
  {
    path: '/sign-in',
    name: 'sign-in',
    component: () => import('@/views/auth/SignInPage.vue'),
    beforeEnter: onlySignedOut,
    meta: { title: 'auth.signIn.title', roles: 'anyone', layout: 'signedOut' },
  },
  {
    path: '/sign-in/forgotten',
    name: 'forgotten-password',
    component: () => import('@/views/auth/ForgottenPasswordPage.vue'),
    meta: { title: 'auth.forgotten.title', roles: 'anyone', layout: 'signedOut' },
  },
  {
    path: '/links/:token',
    name: 'link',
    component: () => import('@/views/auth/LinkPage.vue'),
    props: true,
    meta: { title: 'auth.link.password', roles: 'anyone', layout: 'signedOut' },
  },
];

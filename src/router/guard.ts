import { type Router } from 'vue-router';
import { useSession } from '@/stores/session';
import { i18n } from '@/locales';

/** Signed-out people go to sign in and come back; a page of another role is as if it were not there. The server decides again. */
export function guard(router: Router): void {
  router.beforeEach(async (to) => {
    if (to.meta.roles === 'anyone' && to.name !== 'missing') return true;
    const session = useSession();
    await session.load();
    if (session.person === null) {
      return router.hasRoute('sign-in')
        ? { name: 'sign-in', query: to.fullPath === '/' ? {} : { next: to.fullPath } }
        : true;
    }
    const roles = to.meta.roles;
    if (Array.isArray(roles) && !roles.includes(session.person.role)) {
      return {
        name: 'missing',
        params: { rest: to.path.slice(1).split('/') },
        query: to.query,
        replace: true,
      };
    }
    return true;
  });

  router.afterEach((to) => {
    const title = to.meta.title;
    const { t, te } = i18n.global;
    document.title = title ? `${te(title) ? t(title) : title} · Quartzhold` : 'Quartzhold';
  });
}

/** A place inside this product to go to after signing in; anything else leads to the first page. */
export function safeNext(next: unknown): string {
  return typeof next === 'string' && /^\/(?![/\\])/.test(next) ? next : '/';
}

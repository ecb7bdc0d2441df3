import { type Role } from '@/stores/session';

declare module 'vue-router' {
  interface RouteMeta {
    /** Key of a text or the text itself; shown as the window's title. */
    title?: string;
    /** Who may open it. Left out: everybody who is signed in. 'anyone': also who is not. */
    roles?: readonly Role[] | 'anyone';
    /** 'signedIn' unless said otherwise. */
    layout?: 'signedIn' | 'signedOut' | 'print';
    /** The word of the top bar that this page belongs to, when it is not the first part of its name. */
    section?: string;
  }
}

import 'passport';
import 'express-session';
import { type Role } from '@shared/contract/common';

declare global {
  namespace Express {
    /** The person of the session, loaded anew on each request. */
    interface User {
      id: string;
      name: string;
      email: string;
      role: Role;
      supplierId: string | null;
      sessionEpoch: number;
    }
  }
}
declare module 'express-session' {
  interface SessionData {
    startedAt: number;
    lastUsedAt: number;
    epoch: number;
    device: string;
    address: string;
  }
}
export {};

import { type CookieOptions, type Express, type Request, type Response } from 'express';
import session from 'express-session';
import passport from 'passport';
import { config as currentConfig, type Config } from '../config';
import { Person } from '../models';
import { sessionEnd, touchSession } from './session-clock';
import { allowNewSession, SessionStore } from './session-store';
import { passwordStrategy } from './password-strategy';

type Done = (error: unknown, user?: Express.User | false) => void;

export function cookieName(config: Pick<Config, 'secureCookies'>): string {
  return config.secureCookies ? '__Host-quartzhold' : 'quartzhold';
}

function cookieOptions(config: Pick<Config, 'secureCookies'>): CookieOptions {
  return { httpOnly: true, sameSite: 'lax', secure: config.secureCookies, path: '/' };
}

export function clearSessionCookie(response: Response): void {
  response.clearCookie(cookieName(currentConfig()), cookieOptions(currentConfig()));
}

function startSession(request: Request, user: Express.User): string {
  allowNewSession(request);
  const now = Date.now();
  Object.assign(request.session, {
    startedAt: now,
    lastUsedAt: now,
    epoch: user.sessionEpoch,
    device: (request.get('user-agent') ?? '').slice(0, 300),
    address: request.ip ?? '',
  });
  return user.id;
}

/** Loads the person anew on each request: a disabled person or an old epoch is nobody from the next request on. */
async function personOf(request: Request, id: string): Promise<Express.User | false> {
  const { session } = request;
  const person = await Person.findByPk(id);
  const inTime =
    session.startedAt !== undefined &&
    session.lastUsedAt !== undefined &&
    sessionEnd(session as never).getTime() > Date.now();
  if (!person || person.state !== 'active' || person.sessionEpoch !== session.epoch || !inTime) {
    await new Promise<void>((resolve, reject) => {
      request.sessionStore.destroy(request.sessionID, (error: unknown) =>
        error ? reject(error as Error) : resolve(),
      );
    });
    return false;
  }
  await touchSession(request);
  const { name, email, role, supplierId, sessionEpoch } = person;
  return { id, name, email, role, supplierId, sessionEpoch };
}

export function useSessions(app: Express, config: Config): void {
  const authenticator = new passport.Passport();
  authenticator.use(passwordStrategy());
  authenticator.serializeUser(((request: Request, user: Express.User, done: Done) => {
    done(null, startSession(request, user) as never);
  }) as never);
  authenticator.deserializeUser(((request: Request, id: string, done: Done) => {
    personOf(request, id).then((user) => done(null, user), done);
  }) as never);
  app.use(
    '/api',
    session({
      name: cookieName(config),
      secret: config.SESSION_SECRET,
      store: new SessionStore(),
      resave: false,
      saveUninitialized: false,
      rolling: false,
      cookie: cookieOptions(config) as never,
    }),
    authenticator.initialize(),
    authenticator.session(),
  );
  app.set('authenticator', authenticator);
}

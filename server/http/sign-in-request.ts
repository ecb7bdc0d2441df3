import { type Request, type Response } from 'express';
import { type Authenticator } from 'passport';
import { WrongSignIn } from '../services/sign-in/sign-in';

/**
 * Asks passport's local strategy and starts a session under a new id (the old one dies). Resolves after the session
 * is stored, so that the very next request finds it.
 */
export async function signInRequest(request: Request, response: Response): Promise<Express.User> {
  const authenticator = request.app.get('authenticator') as Authenticator;
  const user = await new Promise<Express.User | false>((resolve, reject) => {
    const answered = (error: unknown, found?: Express.User | false) =>
      error ? reject(error as Error) : resolve(found || false);
    (authenticator.authenticate('local', answered) as (...args: unknown[]) => void)(
      request,
      response,
      reject,
    );
  });
  if (!user) throw new WrongSignIn();
  await logIn(request, user);
  return user;
}

/** The same person under a new session id, after proving who they are once more; the old id dies. */
export function renewSession(request: Request): Promise<void> {
  return logIn(request, request.user!);
}

function logIn(request: Request, user: Express.User): Promise<void> {
  return new Promise((resolve, reject) => {
    request.logIn(user, (error: unknown) => (error ? reject(error as Error) : resolve()));
  });
}

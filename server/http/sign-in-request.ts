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
  await new Promise<void>((resolve, reject) => {
    request.logIn(user, (error: unknown) => (error ? reject(error as Error) : resolve()));
  });
  return user;
}

import { type Request } from 'express';
import { Strategy } from 'passport-local';
import { signIn, WrongSignIn } from '../services/sign-in/sign-in';

/** Passport's local strategy over our own sign-in. */
export function passwordStrategy(): Strategy {
  return new Strategy(
    { usernameField: 'email', passwordField: 'password', passReqToCallback: true },
    (request: Request, email, password, done) => {
      signIn(email, password, request.ip ?? '').then(
        ({ id, name, email: address, role, supplierId, sessionEpoch }) =>
          done(null, { id, name, email: address, role, supplierId, sessionEpoch }),
        (error: unknown) => (error instanceof WrongSignIn ? done(null, false) : done(error)),
      );
    },
  );
}

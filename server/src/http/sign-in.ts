import type { Request } from 'express';
import passport from 'passport';
import { Strategy } from 'passport-local';
import type { Database } from '../database/database';
import { checkPassword } from '../services/check-password';
import './session-types';

/** Passport with e-mail and password; the session keeps nothing but the account's id. */
export function passportFor(database: Database): passport.Authenticator {
  const authenticator = new passport.Passport();
  authenticator.use(
    new Strategy({ usernameField: 'email', passwordField: 'password', session: true }, (email, password, done) => {
      checkPassword(database, email, password).then(
        (id) => done(null, id === null ? false : { id }),
        (error: unknown) => done(error),
      );
    }),
  );
  authenticator.serializeUser<string>((user, done) => done(null, user.id));
  authenticator.deserializeUser<string>((id, done) => done(null, { id }));
  return authenticator;
}

/** Try e-mail and password of the body; on success the session gets a new id, so one set by somebody else is worthless. */
export function signInWithPassword(authenticator: passport.Authenticator, request: Request): Promise<string | null> {
  return new Promise((resolve, reject) => {
    const middleware = authenticator.authenticate('local', (error: unknown, user: Express.User | false | null) => {
      if (error) return reject(error);
      if (!user) return resolve(null);
      request.logIn(user, (failure: unknown) => (failure ? reject(failure) : resolve(user.id)));
    });
    middleware(request, request.res, (error: unknown) => reject(error));
  });
}

/** Sign somebody in who has just proved who they are in another way; the session gets a new id here too. */
export function signInAs(request: Request, userId: string): Promise<void> {
  return new Promise((resolve, reject) => {
    request.logIn({ id: userId }, (failure: unknown) => (failure ? reject(failure) : resolve()));
  });
}

/** End the session: its row goes, so the cookie is worth nothing even where it was copied. */
export function endSession(request: Request): Promise<void> {
  return new Promise((resolve, reject) => {
    request.session.destroy((error: unknown) => (error ? reject(error) : resolve()));
  });
}

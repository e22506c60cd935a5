import type { Request } from 'express';
import passport from 'passport';
import { Strategy } from 'passport-local';
import type { AppDeps } from '#server/app-deps.ts';
import { findActor, findByPassword } from '#server/services/person-sign-in.ts';
import type { Actor } from './route-record.ts';

const authenticators = new WeakMap<AppDeps, passport.Authenticator>();

/**
 * Passport for one application: e-mail and password, and the person of a session. Each application has its own,
 * because the package's shared instance would ask the database of whichever was made first.
 */
export function configurePassport(deps: AppDeps): passport.Authenticator {
  const known = authenticators.get(deps);
  if (known) return known;
  const authenticator = new passport.Passport() as passport.Authenticator;
  authenticator.use(
    new Strategy({ usernameField: 'email' }, (email, password, done) => {
      findByPassword(deps.db.manager, email, password).then((actor) => done(null, actor ?? false), done);
    }),
  );
  authenticator.serializeUser((user, done) => done(null, (user as Actor).id));
  authenticator.deserializeUser((personId: string, done) => {
    findActor(deps.db.manager, personId).then((actor) => done(null, actor ?? false), done);
  });
  authenticators.set(deps, authenticator);
  return authenticator;
}

/** The person whose e-mail and password the request's body carries; null when they do not belong together. */
export function checkCredentials(deps: AppDeps, req: Request): Promise<Actor | null> {
  return new Promise((resolve, reject) => {
    const done: passport.AuthenticateCallback = (error, user) =>
      error ? reject(error) : resolve((user as Actor | false | undefined) || null);
    // With a callback passport neither answers nor goes on by itself.
    configurePassport(deps).authenticate('local', { session: false }, done)(req, req.res, reject);
  });
}

/** Signs a person in on this request: under a new session id, so that one planted before is worth nothing. */
export const startSession = (req: Request, actor: Actor): Promise<void> =>
  new Promise((resolve, reject) => req.logIn(actor, (error) => (error ? reject(error) : resolve())));

/** Ends this request's session and goes on under a new anonymous one. */
export const endSession = (req: Request): Promise<void> =>
  new Promise((resolve, reject) => req.logOut((error) => (error ? reject(error) : resolve())));

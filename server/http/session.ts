import connectPgSimple from 'connect-pg-simple';
import session from 'express-session';
import type pg from 'pg';
import type { AppDeps } from '#server/app-deps.ts';

const TWELVE_HOURS_MS = 12 * 60 * 60 * 1000;

/** The pool TypeORM already holds, so that sessions need no second one. */
const poolOf = (deps: AppDeps): pg.Pool => (deps.db.driver as unknown as { master: pg.Pool }).master;

/** Sessions in PostgreSQL, renewed by use; the cookie is secure wherever PUBLIC_URL is https. */
export function createSessionMiddleware(deps: AppDeps) {
  const PgStore = connectPgSimple(session);
  return session({
    name: 'tracehead.sid',
    secret: deps.config.sessionSecret,
    store: new PgStore({
      pool: poolOf(deps),
      tableName: 'session',
      errorLog: (...error: unknown[]) => deps.logger.warn({ error }, 'session store'),
    }),
    resave: false,
    saveUninitialized: false,
    rolling: true,
    cookie: {
      httpOnly: true,
      sameSite: 'lax',
      secure: deps.config.publicUrl.startsWith('https:'),
      maxAge: TWELVE_HOURS_MS,
    },
  });
}

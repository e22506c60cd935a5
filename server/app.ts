import express, { type Express } from 'express';
import helmet from 'helmet';
import type { AppDeps } from './app-deps.ts';
import { notFound } from './errors/app-error.ts';
import { healthRouter } from './http/health.ts';
import { mountRoutes } from './http/mount-routes.ts';
import { problemMapper } from './http/problem-mapper.ts';
import { requestLog } from './http/request-log.ts';
import { serveClient } from './http/serve-client.ts';
import { createSessionMiddleware } from './http/session.ts';
import { configurePassport } from './http/sign-in-strategy.ts';
import { routes } from './routes/index.ts';

function securityHeaders(deps: AppDeps) {
  const secure = deps.config.publicUrl.startsWith('https:');
  return helmet({
    contentSecurityPolicy: {
      directives: {
        'default-src': ["'self'"],
        'img-src': ["'self'", 'data:', 'blob:'],
        'worker-src': ["'self'", 'blob:'],
        'style-src': ["'self'", "'unsafe-inline'"],
        // On loopback without TLS the upgrade would send every request nowhere.
        'upgrade-insecure-requests': secure ? [] : null,
      },
    },
    strictTransportSecurity: secure,
  });
}

/** The whole application without listening: middleware in order, API, client, errors. */
export function createApp(deps: AppDeps): Express {
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', 'loopback');
  app.use(requestLog(deps.logger));
  app.use((req, res, next) => {
    res.setHeader('X-Request-Id', String(req.id));
    next();
  });
  app.use(securityHeaders(deps));
  app.use(healthRouter(deps));
  const signIns = configurePassport(deps);
  app.use('/api/v1', createSessionMiddleware(deps), signIns.session(), mountRoutes(routes, deps), () => {
    throw notFound('There is nothing at this address.');
  });
  app.use(serveClient(deps));
  app.use(problemMapper);
  return app;
}

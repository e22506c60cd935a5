import { existsSync } from 'node:fs';
import path from 'node:path';
import express, { Router } from 'express';
import type { AppDeps } from '#server/app-deps.ts';
import { AppError } from '#server/errors/app-error.ts';

/** The built client: hashed assets are kept for ever, every other address gets the page itself. */
export function serveClient({ config }: AppDeps): Router {
  const router = Router();
  const page = path.join(config.clientDir, 'index.html');
  router.use(
    '/assets',
    express.static(path.join(config.clientDir, 'assets'), {
      immutable: true,
      maxAge: '1y',
      fallthrough: false,
    }),
  );
  router.use(express.static(config.clientDir, { index: false, maxAge: '1h' }));
  router.get('/{*path}', (_req, res) => {
    if (!existsSync(page))
      throw new AppError(
        'unavailable',
        503,
        'The client is not built',
        'Start the product with "npm start", or run "npm run build" first.',
      );
    res.setHeader('Cache-Control', 'no-cache');
    res.sendFile(page);
  });
  return router;
}

import { Router } from 'express';
import type { AppDeps } from '#server/app-deps.ts';

type Check = 'ok' | 'failed';
interface Readiness {
  database: Check;
  migrations: Check;
  disk: Check;
}

const done = async (check: Promise<boolean>): Promise<Check> => {
  try {
    return (await check) ? 'ok' : 'failed';
  } catch {
    // Why it failed is in the log of the part itself; whoever asks here only wants to know whether to send traffic.
    return 'failed';
  }
};

async function isEveryMigrationDone({ db }: AppDeps): Promise<boolean> {
  const rows: Array<{ name: string }> = await db.query('SELECT name FROM migration');
  const names = new Set(rows.map((row) => row.name));
  return db.migrations.every((migration) => names.has(migration.name ?? migration.constructor.name));
}

async function readiness(deps: AppDeps): Promise<Readiness> {
  const [database, migrations, disk] = await Promise.all([
    done(deps.db.query('SELECT 1').then(() => true)),
    done(isEveryMigrationDone(deps)),
    done(deps.storage.freeBytes().then((free) => free >= deps.config.minFreeBytes)),
  ]);
  return { database, migrations, disk };
}

/** For supervisors: `/healthz` says that the process lives, `/readyz` that it can do its work. */
export function healthRouter(deps: AppDeps): Router {
  const router = Router();
  router.get('/healthz', (_req, res) => {
    res.setHeader('Cache-Control', 'no-store');
    res.json({ status: 'alive' });
  });
  router.get('/readyz', async (_req, res) => {
    const checks = await readiness(deps);
    const ready = Object.values(checks).every((check) => check === 'ok');
    res.setHeader('Cache-Control', 'no-store');
    res.status(ready ? 200 : 503).json({ status: ready ? 'ready' : 'not ready', checks });
  });
  return router;
}

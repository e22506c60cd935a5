import path from 'node:path';
import { fileURLToPath } from 'node:url';
import * as z from 'zod/mini';

const projectRoot = fileURLToPath(new URL('../../', import.meta.url));

const environment = z.object({
  NODE_ENV: z._default(z.enum(['development', 'production', 'test']), 'development'),
  DATABASE_URL: z.string().check(z.regex(/^postgres(ql)?:\/\//, 'must start with postgres://')),
  DATABASE_APP_URL: z.optional(
    z.string().check(z.regex(/^postgres(ql)?:\/\//, 'must start with postgres://')),
  ),
  HOST: z._default(z.string(), '127.0.0.1'),
  PORT: z._default(z.coerce.number().check(z.int(), z.gte(0), z.lte(65_535)), 4180),
  PUBLIC_URL: z.optional(z.url()),
  SESSION_SECRET: z.optional(z.string().check(z.minLength(32, 'must have at least 32 characters'))),
  SMTP_URL: z.optional(z.string().check(z.regex(/^smtps?:\/\//, 'must start with smtp:// or smtps://'))),
  MAIL_FROM: z._default(z.string(), 'Tracehead <tracehead@localhost>'),
  STORAGE_DIR: z._default(z.string(), path.join(projectRoot, 'storage')),
  LOG_LEVEL: z._default(z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']), 'info'),
  MIN_FREE_BYTES: z._default(z.coerce.number().check(z.int(), z.nonnegative()), 512 * 1024 * 1024),
});

export interface AppConfig {
  production: boolean;
  /** Owner of the database: runs the migrations. */
  databaseUrl: string;
  /** Login of the application's role; null = the owner's login with the role taken on connecting. */
  databaseAppUrl: string | null;
  host: string;
  port: number;
  publicUrl: string;
  sessionSecret: string;
  /** null = mails are written to `<storageDir>/outbox`. */
  smtpUrl: string | null;
  mailFrom: string;
  storageDir: string;
  clientDir: string;
  logLevel: string;
  /** Free bytes below which uploads are refused. */
  minFreeBytes: number;
}

/** Settings that cannot be used; lists every fault. */
export class ConfigError extends Error {}

/**
 * Reads the settings from the environment, once.
 * @throws ConfigError naming every fault; in production also a missing SESSION_SECRET
 */
export function readConfig(env: NodeJS.ProcessEnv): AppConfig {
  const parsed = z.safeParse(environment, env);
  const faults = parsed.success
    ? []
    : parsed.error.issues.map((issue) => `${issue.path.map(String).join('.')}: ${issue.message}`);
  if (env.NODE_ENV === 'production' && !env.SESSION_SECRET)
    faults.push('SESSION_SECRET: must be set in production, to at least 32 random characters');
  if (!parsed.success || faults.length > 0)
    throw new ConfigError(`These settings cannot be used:\n  ${faults.join('\n  ')}`);
  const settings = parsed.data;
  return {
    production: settings.NODE_ENV === 'production',
    databaseUrl: settings.DATABASE_URL,
    databaseAppUrl: settings.DATABASE_APP_URL ?? null,
    host: settings.HOST,
    port: settings.PORT,
    publicUrl: settings.PUBLIC_URL ?? `http://${settings.HOST}:${settings.PORT}`,
    // Outside production a fixed secret is enough: the start script passes one of its own.
    sessionSecret: settings.SESSION_SECRET ?? 'only-for-development-and-tests-0000000000',
    smtpUrl: settings.SMTP_URL ?? null,
    mailFrom: settings.MAIL_FROM,
    storageDir: path.resolve(settings.STORAGE_DIR),
    clientDir: path.join(projectRoot, 'dist', 'client'),
    logLevel: settings.LOG_LEVEL,
    minFreeBytes: settings.MIN_FREE_BYTES,
  };
}

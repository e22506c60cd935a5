import path from 'node:path';
import { fileURLToPath } from 'node:url';
import * as z from 'zod/mini';

const projectRoot = fileURLToPath(new URL('../../', import.meta.url));

/** An empty variable counts as one that was not set, as `NAME= npm start` means it. */
const setting = <S extends z.core.$ZodType>(schema: S) =>
  z.pipe(
    z.transform((value: unknown) => (value === '' ? undefined : value)),
    schema,
  );
const oneOf = <const T extends readonly string[]>(names: T) =>
  z.enum(names, `must be one of ${names.join(', ')}`);
const wholeNumber = (least: number, most: number) => {
  const words = `must be a whole number from ${least} to ${most}`;
  return z.coerce.number(words).check(z.int(words), z.gte(least, words), z.lte(most, words));
};
const postgresUrl = z.string().check(z.regex(/^postgres(ql)?:\/\//, 'must start with postgres://'));

const environment = z.object({
  NODE_ENV: setting(z._default(oneOf(['development', 'production', 'test']), 'development')),
  DATABASE_URL: setting(z.optional(postgresUrl)),
  DATABASE_APP_URL: setting(z.optional(postgresUrl)),
  HOST: setting(z._default(z.string(), '127.0.0.1')),
  PORT: setting(z._default(wholeNumber(0, 65_535), 4180)),
  PUBLIC_URL: setting(
    z.optional(
      z.url({ protocol: /^https?$/, error: 'must be an address that starts with http:// or https://' }),
    ),
  ),
  SESSION_SECRET: setting(z.optional(z.string().check(z.minLength(32, 'must have at least 32 characters')))),
  SMTP_URL: setting(
    z.optional(z.string().check(z.regex(/^smtps?:\/\//, 'must start with smtp:// or smtps://'))),
  ),
  MAIL_FROM: setting(z._default(z.string(), 'Tracehead <tracehead@localhost>')),
  STORAGE_DIR: setting(z._default(z.string(), path.join(projectRoot, 'storage'))),
  LOG_LEVEL: setting(z._default(oneOf(['fatal', 'error', 'warn', 'info', 'debug', 'silent']), 'info')),
  MIN_FREE_BYTES: setting(z._default(wholeNumber(0, Number.MAX_SAFE_INTEGER), 512 * 1024 * 1024)),
});

export interface AppConfig {
  production: boolean;
  /** Owner of the database, who runs migrations; null in a server that was given only the application's login. */
  databaseUrl: string | null;
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
  const faults = [...(parsed.error?.issues ?? []).map(faultOf), ...faultsAcross(env)];
  if (!parsed.success || faults.length > 0)
    throw new ConfigError(`These settings cannot be used:\n  ${faults.join('\n  ')}`);
  const settings = parsed.data;
  return {
    production: settings.NODE_ENV === 'production',
    databaseUrl: settings.DATABASE_URL ?? null,
    databaseAppUrl: settings.DATABASE_APP_URL ?? null,
    host: settings.HOST,
    port: settings.PORT,
    publicUrl: (settings.PUBLIC_URL ?? `http://${settings.HOST}:${settings.PORT}`).replace(/\/+$/, ''),
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

const faultOf = (issue: z.core.$ZodIssue) => `${issue.path.map(String).join('.')}: ${issue.message}`;

/** Faults that no single setting has. */
function faultsAcross(env: NodeJS.ProcessEnv): string[] {
  const faults: string[] = [];
  if (!env.DATABASE_URL && !env.DATABASE_APP_URL)
    faults.push('DATABASE_URL: must name a database, or start with "npm start", which makes one');
  if (env.NODE_ENV === 'production' && !env.SESSION_SECRET)
    faults.push('SESSION_SECRET: must be set in production, to at least 32 random characters');
  return faults;
}

import { createInterface } from 'node:readline/promises';
import { text as readAll } from 'node:stream/consumers';
import { parseArgs } from 'node:util';
import * as z from 'zod/mini';
import { readConfig } from '#server/config/config.ts';
import { makeAdmin } from '#server/services/person-make-admin.ts';
import { INVITATION_DAYS } from '#server/services/person-token.ts';
import { email, requiredText } from '#shared/contract/common.ts';
import { MAX_PASSWORD_LENGTH, MIN_PASSWORD_LENGTH } from '#shared/contract/limits.ts';
import { newPassword } from '#shared/contract/people.ts';
import { withOwner } from './owner-data-source.ts';

/**
 * Makes the first administrator: npm run create-admin -- --email ada@example.org --name "Ada Quist"
 * The password comes from ADMIN_PASSWORD or, with --password-stdin, from standard input; otherwise a link is printed
 * through which the person chooses one.
 */
const USAGE =
  'Usage: npm run create-admin -- --email <address> --name <name> [--password-stdin]\n' +
  'Without ADMIN_PASSWORD or --password-stdin a link is printed for choosing a password.';

class UsageError extends Error {}

function readArguments() {
  try {
    return parseArgs({
      options: {
        email: { type: 'string' },
        name: { type: 'string' },
        'password-stdin': { type: 'boolean', default: false },
      },
    }).values;
  } catch (error) {
    throw new UsageError(error instanceof Error ? error.message : String(error));
  }
}

async function ask(question: string): Promise<string> {
  if (!process.stdin.isTTY) throw new UsageError(`${question} is missing.`);
  const terminal = createInterface({ input: process.stdin, output: process.stdout });
  try {
    return await terminal.question(`${question}: `);
  } finally {
    terminal.close();
  }
}

function checked<S extends z.core.$ZodType>(schema: S, value: string, fault: string): z.output<S> {
  const result = z.safeParse(schema, value);
  if (!result.success) throw new UsageError(fault);
  return result.data;
}

async function readPassword(fromStdin: boolean): Promise<string | null> {
  // A line break at the end belongs to the file or the echo, not to the password.
  const given = fromStdin ? (await readAll(process.stdin)).replace(/\r?\n$/, '') : process.env.ADMIN_PASSWORD;
  if (!given && !fromStdin) return null;
  const lengths = `${MIN_PASSWORD_LENGTH} to ${MAX_PASSWORD_LENGTH}`;
  return checked(newPassword, given ?? '', `The password needs ${lengths} characters.`);
}

async function main(): Promise<void> {
  const given = readArguments();
  const request = {
    email: checked(email, given.email ?? (await ask('E-mail address')), 'The e-mail address is not valid.'),
    name: checked(requiredText, given.name ?? (await ask('Name')), 'The name is empty or too long.'),
    password: await readPassword(given['password-stdin']),
  };
  const token = await withOwner(async (db) => {
    // In production this may well be the first thing that is ever run.
    await db.runMigrations({ transaction: 'each' });
    return db.transaction((manager) => makeAdmin(manager, request, new Date()));
  });
  console.log(`${request.email} is an administrator.`);
  if (token === null) return;
  const { publicUrl } = readConfig(process.env);
  console.log(`A password is chosen here, once and within ${INVITATION_DAYS} days:`);
  console.log(`${publicUrl}/invitation#${token}`);
}

main().catch((error: unknown) => {
  const isUsage = error instanceof UsageError;
  console.error(isUsage ? `${error.message}\n${USAGE}` : error);
  process.exitCode = isUsage ? 2 : 1;
});

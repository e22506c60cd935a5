import { createHash } from 'node:crypto';
import type { Request } from 'express';
import { RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible';
import type { AppDeps } from '#server/app-deps.ts';
import { AppError } from '#server/errors/app-error.ts';

const WINDOW_SECONDS = 15 * 60;
/** Wrong passwords for one account from one address. */
const FAILURES_PER_ACCOUNT = 10;
/** Wrong passwords from one address for all accounts: an office behind one address has many people. */
const FAILURES_PER_ADDRESS = 200;
/** Reset mails asked for from one address, and for one account. */
const RESETS_PER_ADDRESS = 20;
const RESETS_PER_ACCOUNT = 3;

type Limiter = 'account' | 'address' | 'resetAddress' | 'resetAccount';
const POINTS: Record<Limiter, number> = {
  account: FAILURES_PER_ACCOUNT,
  address: FAILURES_PER_ADDRESS,
  resetAddress: RESETS_PER_ADDRESS,
  resetAccount: RESETS_PER_ACCOUNT,
};
const limitersOf = new WeakMap<AppDeps, Map<Limiter, RateLimiterPostgres>>();

/** Counts are kept in the database, so that several processes count together and a restart forgets nothing. */
function limiter(deps: AppDeps, name: Limiter): RateLimiterPostgres {
  const known = limitersOf.get(deps) ?? new Map<Limiter, RateLimiterPostgres>();
  limitersOf.set(deps, known);
  const made =
    known.get(name) ??
    new RateLimiterPostgres({
      storeClient: deps.db,
      storeType: 'typeorm',
      tableName: 'sign_in_failure',
      tableCreated: true,
      keyPrefix: name,
      points: POINTS[name],
      duration: WINDOW_SECONDS,
    });
  known.set(name, made);
  return made;
}

/** One household or office: an IPv6 customer holds a whole /64, so counting single addresses would count nothing. */
export function addressKey(ip: string): string {
  const plain = ip.replace(/^::ffff:(?=\d+\.)/i, '');
  if (!plain.includes(':')) return plain;
  const [head = '', tail = ''] = plain.split('::');
  const left = head === '' ? [] : head.split(':');
  const right = tail === '' ? [] : tail.split(':');
  const zeros = plain.includes('::') ? Array<string>(8 - left.length - right.length).fill('0') : [];
  return `${[...left, ...zeros, ...right]
    .slice(0, 4)
    .map((part) => Number.parseInt(part, 16).toString(16))
    .join(':')}::/64`;
}

/** Hashed, because an address may be longer than the store's key and need not be readable there. */
const accountKey = (account: string, from: string) =>
  createHash('sha256').update(`${from} ${account}`).digest('hex');

/** Takes one point; false when none is left, with the seconds until there is one. */
async function take(deps: AppDeps, name: Limiter, key: string): Promise<{ ok: boolean; seconds: number }> {
  try {
    await limiter(deps, name).consume(key);
    return { ok: true, seconds: 0 };
  } catch (refusal) {
    if (!(refusal instanceof RateLimiterRes)) throw refusal;
    return { ok: false, seconds: Math.max(1, Math.ceil(refusal.msBeforeNext / 1000)) };
  }
}

function tooMany(req: Request, seconds: number): AppError {
  req.res?.setHeader('Retry-After', String(seconds));
  const minutes = Math.ceil(seconds / 60);
  return new AppError(
    'too-many-requests',
    429,
    'Too many attempts',
    `There were too many wrong attempts. Try again in ${minutes} ${minutes === 1 ? 'minute' : 'minutes'}, or reset your password.`,
    { extra: { retryAfterSeconds: seconds } },
  );
}

/**
 * Runs a check of a password, which answers null when it is wrong. Wrong ones count against the account as seen
 * from this address, and against the address; right ones do not count. A point is taken before the check, so that
 * many attempts at once cannot slip through together.
 * @throws AppError too-many-requests, for known and unknown accounts alike
 */
export async function throttled<T>(
  deps: AppDeps,
  req: Request,
  account: string,
  check: () => Promise<T | null>,
): Promise<T | null> {
  const from = addressKey(req.ip ?? '');
  const key = accountKey(account.trim().toLowerCase(), from);
  const forAccount = await take(deps, 'account', key);
  if (!forAccount.ok) throw tooMany(req, forAccount.seconds);
  const forAddress = await take(deps, 'address', from);
  if (!forAddress.ok) throw tooMany(req, forAddress.seconds);
  const found = await check();
  if (found !== null) {
    await limiter(deps, 'account').delete(key);
    await limiter(deps, 'address').reward(from);
  }
  return found;
}

/**
 * Whether one more reset mail may go to the account. Too many for one account are left out without a word, since
 * saying so would tell that the account exists.
 * @throws AppError too-many-requests when the address asks for too many
 */
export async function maySendReset(deps: AppDeps, req: Request, account: string): Promise<boolean> {
  const address = await take(deps, 'resetAddress', addressKey(req.ip ?? ''));
  if (!address.ok) throw tooMany(req, address.seconds);
  return (await take(deps, 'resetAccount', accountKey(account, ''))).ok;
}

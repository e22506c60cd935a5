import type { Request } from 'express';
import type { AppDeps } from '#server/app-deps.ts';
import { invalidInput } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { throttled } from '#server/http/sign-in-throttle.ts';
import { findByPassword } from '#server/services/person-sign-in.ts';
import { inTransaction, type ServiceDeps } from '#server/services/service-deps.ts';

/**
 * Does what a person signs for, in one transaction, after they have entered their password again: a session left open
 * on a desk signs nothing. Wrong passwords count as at sign-in, so that a session is no way round its limit.
 * @throws AppError invalid-input when the password is wrong, too-many-requests
 */
export async function signed<T>(
  deps: AppDeps,
  req: Request,
  actor: Actor,
  password: string,
  work: (tx: ServiceDeps) => Promise<T>,
): Promise<T> {
  const signer = await throttled(deps, req, actor.email, () =>
    findByPassword(deps.db.manager, actor.email, password),
  );
  if (signer?.id !== actor.id)
    throw invalidInput([{ path: 'password', message: 'This is not your password. Nothing was signed.' }]);
  return inTransaction(deps, work);
}

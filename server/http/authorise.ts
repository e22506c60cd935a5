import type { Request } from 'express';
import type { AppDeps } from '#server/app-deps.ts';
import { forbidden, notFound, notSignedIn } from '#server/errors/app-error.ts';
import { allowsGlobally, allowsOnDam } from '#server/policies/dam-policy.ts';
import { loadDamScope } from './dam-scope.ts';
import type { AccessRule, Actor, DamScope } from './route-record.ts';

/**
 * Decides whether the request may go on and with which dam scope.
 * @throws AppError not-signed-in, not-found (also for a dam one may not even read) or forbidden
 */
export async function authorise(
  access: AccessRule,
  req: Request,
  deps: AppDeps,
): Promise<{ actor: Actor | null; scope: DamScope | null }> {
  const actor = (req.user as Actor | undefined) ?? null;
  if (access.who === 'public' || access.who === 'signedLink') return { actor, scope: null };
  if (!actor) throw notSignedIn();
  if (access.who === 'signedIn') return { actor, scope: null };
  if (access.who === 'global') {
    if (!allowsGlobally(access.action, actor)) throw forbidden('Only an administrator may do this.');
    return { actor, scope: null };
  }
  const targetId = req.params[`${access.target}Id`];
  const scope = await loadDamScope(deps.db.manager, actor, access.target, String(targetId));
  if (!scope || !allowsOnDam('dam.read', scope)) throw notFound();
  if (!allowsOnDam(access.action, scope)) throw forbidden();
  return { actor, scope };
}

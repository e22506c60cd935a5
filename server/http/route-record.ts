import type { Request, Response } from 'express';
import type * as z from 'zod/mini';
import type { AppDeps } from '#server/app-deps.ts';
import type { DamAction, DamRole, GlobalAction } from '#shared/contract/actions.ts';

/** What an id in the path names; the dam it belongs to is found from it. */
export type TargetKind = 'dam' | 'drawing' | 'sheet' | 'section' | 'net' | 'note' | 'revision';

/**
 * Who may call a route. Every record states one; the target's id is the path parameter `<target>Id`.
 * Somebody who may not even read the dam gets 404, a reader who may not do this gets 403.
 */
export type AccessRule =
  | { who: 'public' }
  /** Whoever holds a link that the handler verifies: a mail program, which has neither a session nor its token. */
  | { who: 'signedLink' }
  | { who: 'signedIn' }
  | { who: 'global'; action: GlobalAction }
  | { who: 'dam'; action: DamAction; target: TargetKind };

export interface Actor {
  id: string;
  name: string;
  email: string;
  admin: boolean;
}

/** The dam a request is about and the actor's parts on it; null for routes that are about no dam. */
export interface DamScope {
  damId: string;
  roles: DamRole[];
  admin: boolean;
}

type Schema = z.core.$ZodType;
type Out<S> = S extends Schema ? z.output<S> : undefined;

export interface RouteContext<P = unknown, Q = unknown, B = unknown> {
  params: P;
  query: Q;
  body: B;
  deps: AppDeps;
  req: Request;
  res: Response;
}

export interface RouteRecord {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  /** Path below /api/v1, kebab-case plurals: `/dams/:damId/drawings`. */
  path: string;
  access: AccessRule;
  /** That a route about a net or a revision tells none of its figures, so that it is answered to who may read blind. */
  figures: 'none' | undefined;
  params: Schema | undefined;
  query: Schema | undefined;
  body: Schema | undefined;
  reply: Schema | undefined;
  status: number;
  handle: (context: RouteContext & { actor: Actor | null; scope: DamScope | null }) => Promise<unknown>;
}

interface RouteDefinition<
  A extends AccessRule,
  P extends Schema | undefined,
  Q extends Schema | undefined,
  B extends Schema | undefined,
  R extends Schema | undefined,
> {
  method: RouteRecord['method'];
  path: string;
  access: A;
  figures?: 'none';
  params?: P;
  query?: Q;
  /** Schema of a JSON body. A route without one that takes bytes reads `req` itself, after policy and CSRF. */
  body?: B;
  /** Schema of the reply; unknown members are stripped. Without one the handler answers through `res` or with nothing. */
  reply?: R;
  /** Status of success; 200, or 204 without a reply schema. */
  status?: number;
  handle: (
    context: RouteContext<Out<P>, Out<Q>, Out<B>> & {
      actor: A extends { who: 'public' | 'signedLink' } ? Actor | null : Actor;
      scope: A extends { who: 'dam' } ? DamScope : null;
    },
  ) => Promise<R extends Schema ? z.input<R> : void>;
}

/** Makes a route record whose handler is typed by its schemas and access rule. */
export function defineRoute<
  const A extends AccessRule,
  P extends Schema | undefined = undefined,
  Q extends Schema | undefined = undefined,
  B extends Schema | undefined = undefined,
  R extends Schema | undefined = undefined,
>(definition: RouteDefinition<A, P, Q, B, R>): RouteRecord {
  const { method, path, access, figures, params, query, body, reply, status, handle } = definition;
  return {
    method,
    path,
    access,
    figures,
    params,
    query,
    body,
    reply,
    status: status ?? (reply ? 200 : 204),
    handle: handle as RouteRecord['handle'],
  };
}

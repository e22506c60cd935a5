import type { AppDeps } from '#server/app-deps.ts';
import type { JobHandler } from '#server/jobs/jobs-port.ts';
import { makeDigest } from '#server/services/make-digest.ts';
import { inTransaction } from '#server/services/service-deps.ts';

/** Job `send-digest`: the id is that of a row of `mail_digest`. */
export const createSendDigestHandler =
  (deps: AppDeps): JobHandler =>
  (digestId) =>
    inTransaction(deps, (tx) => makeDigest(tx, digestId));

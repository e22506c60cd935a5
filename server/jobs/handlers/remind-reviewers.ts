import type { AppDeps } from '#server/app-deps.ts';
import type { JobHandler } from '#server/jobs/jobs-port.ts';
import { remindReviewers } from '#server/services/review-reminders.ts';
import { inTransaction } from '#server/services/service-deps.ts';

/** Job `remind-reviewers`: the id is that of a row of `review_reminder`. */
export const createRemindReviewersHandler =
  (deps: AppDeps): JobHandler =>
  (reminderId) =>
    inTransaction(deps, (tx) => remindReviewers(tx, reminderId));

import type { JobHandler } from '#server/jobs/jobs-port.ts';
import { type DeliveryDeps, deliverMail } from '#server/services/mail-delivery.ts';

/** Job `send-mail`: the id is that of a row of `outbox_mail`. */
export const createSendMailHandler =
  (deps: DeliveryDeps): JobHandler =>
  (mailId) =>
    deliverMail(deps, mailId);

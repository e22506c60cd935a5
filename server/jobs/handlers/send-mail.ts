import type { AppDeps } from '#server/app-deps.ts';
import type { JobHandler } from '#server/jobs/jobs-port.ts';
import { type DeliveryDeps, deliverMail } from '#server/services/mail-delivery.ts';
import { revisionPicture } from './revision-picture.ts';

type SendingDeps = AppDeps & Pick<DeliveryDeps, 'mailer' | 'forgetLinks'>;

/** Job `send-mail`: the id is that of a row of `outbox_mail`. */
export const createSendMailHandler =
  (deps: SendingDeps): JobHandler =>
  (mailId) =>
    deliverMail({ ...deps, pictureOf: (revisionId) => revisionPicture(deps, revisionId) }, mailId);

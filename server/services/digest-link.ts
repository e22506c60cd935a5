import { createHmac, timingSafeEqual } from 'node:crypto';
import type { AppConfig } from '#server/config/config.ts';
import { AppError } from '#server/errors/app-error.ts';

type LinkConfig = Pick<AppConfig, 'publicUrl' | 'sessionSecret'>;

const PURPOSE = 'stop the daily digest';

/** Signed, so that nobody stops another's digests; it never expires, since an old mail may be the one at hand. */
const signatureOf = ({ sessionSecret }: LinkConfig, personId: string) =>
  createHmac('sha256', sessionSecret).update(`${PURPOSE} ${personId}`).digest();

export const digestStopToken = (config: LinkConfig, personId: string): string =>
  `${personId}.${signatureOf(config, personId).toString('base64url')}`;

/** Where a mail program stops the digests by one request; one that only opens it is led to the page. */
export const digestStopUrl = (config: LinkConfig, personId: string): string =>
  `${config.publicUrl}/api/v1/digest-stops?token=${digestStopToken(config, personId)}`;

/** The page with the button. To be opened, as scanners of mails do, stops nothing. */
export const digestStopPage = ({ publicUrl }: LinkConfig, token: string): string =>
  `${publicUrl}/stop-digest?token=${encodeURIComponent(token)}`;

/** Whose digests a token stops. @throws AppError token-invalid */
export function personOfStopToken(config: LinkConfig, token: string): string {
  const [personId = '', signature = ''] = token.split('.', 2);
  const given = Buffer.from(signature, 'base64url');
  const right = signatureOf(config, personId);
  if (given.length === right.length && timingSafeEqual(given, right)) return personId;
  throw new AppError(
    'token-invalid',
    410,
    'This link does not work',
    'The link is incomplete, or the installation has been set up anew since. Sign in and choose on your account page how mails come.',
  );
}

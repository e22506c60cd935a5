import type { AppConfig } from '#server/config/config.ts';
import type { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import type { OutgoingMail } from '#server/mail/mailer-port.ts';
import { withPicture } from '#server/mail/templates/letter.ts';
import { digestStopUrl } from './digest-link.ts';

/** A section with its net, small enough for a mail. */
export interface SectionPicture {
  jpeg: Buffer;
  alt: string;
  /** At which it is shown; the file may be finer. */
  widthPx: number;
}

export interface DressingDeps {
  config: Pick<AppConfig, 'publicUrl' | 'sessionSecret'>;
  /** The section of a revision; null where none can be made now, and then the mail goes without. */
  pictureOf: (revisionId: string) => Promise<SectionPicture | null>;
}

/** A mail of the outbox as it goes out: with its picture, and with what stops a digest. */
export async function outgoingMail(
  { config, pictureOf }: DressingDeps,
  mail: OutboxMailEntity,
): Promise<OutgoingMail> {
  const picture = mail.revisionId === null ? null : await pictureOf(mail.revisionId);
  const contentId = `section-${mail.id}@${new URL(config.publicUrl).hostname}`;
  return {
    messageId: mail.messageId,
    to: mail.toAddress,
    subject: mail.subject,
    text: mail.text,
    html: withPicture(mail.html, picture && { ...picture, source: `cid:${contentId}` }),
    pictures: picture ? [{ contentId, fileName: 'section.jpg', jpeg: picture.jpeg }] : [],
    stopUrl: mail.kind === 'digest' && mail.personId ? digestStopUrl(config, mail.personId) : null,
    date: mail.createdAt,
  };
}

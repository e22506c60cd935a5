import type { AppConfig } from '#server/config/config.ts';
import { withPicture } from '#server/mail/templates/letter.ts';
import { SAMPLE_PICTURE, sampleLetters } from '#server/mail/templates/sample-letters.ts';
import { mayWait } from '#server/policies/mail-policy.ts';
import type { MailTemplateDto } from '#shared/contract/mails.ts';

/** Every kind of mail, filled with sample data, as it would go out. */
export function mailTemplates({ publicUrl }: Pick<AppConfig, 'publicUrl'>): MailTemplateDto[] {
  return sampleLetters(publicUrl).map(({ kind, subject, text, html }) => ({
    kind,
    mayWait: mayWait(kind),
    subject,
    text,
    html: withPicture(html, SAMPLE_PICTURE),
  }));
}

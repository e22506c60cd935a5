import type { SendMailOptions } from 'nodemailer';
import type { OutgoingMail } from './mailer-port.ts';

/** A mail as nodemailer takes it. */
export function nodemailerMessage(mail: OutgoingMail, from: string): SendMailOptions {
  const { messageId, to, subject, text, html, date, pictures, stopUrl } = mail;
  return {
    from,
    to,
    messageId,
    subject,
    text,
    html,
    date,
    attachments: pictures.map(({ contentId, fileName, jpeg }) => ({
      cid: contentId,
      filename: fileName,
      content: jpeg,
      contentType: 'image/jpeg',
      contentDisposition: 'inline',
    })),
    headers: {
      // Answers of absence are not sent to what no person has written.
      'Auto-Submitted': 'auto-generated',
      ...(stopUrl ? { 'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click' } : {}),
    },
    ...(stopUrl ? { list: { unsubscribe: stopUrl } } : {}),
  };
}

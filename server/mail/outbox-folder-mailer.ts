import { mkdir, rename, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { createTransport } from 'nodemailer';
import type { MailerPort, OutgoingMail } from './mailer-port.ts';
import { nodemailerMessage } from './nodemailer-message.ts';

/** Mail for a machine without a mail server: a folder with an .eml file and a readable text for each mail. */
export function createOutboxFolderMailer({ folder, from }: { folder: string; from: string }): MailerPort {
  const transport = createTransport({ streamTransport: true, buffer: true, newline: 'windows' });
  return {
    async send(mail) {
      const { message } = await transport.sendMail(nodemailerMessage(mail, from));
      await mkdir(folder, { recursive: true });
      const name = path.join(folder, fileName(mail));
      await writeWhole(`${name}.eml`, message as Buffer);
      await writeWhole(`${name}.txt`, readable(mail, from));
    },
    close: () => transport.close(),
  };
}

/** From the time and the id, so that the folder lists in order and a repeat replaces itself. */
function fileName({ date, messageId }: OutgoingMail): string {
  const time = date.toISOString().replaceAll(/[:.]/g, '-');
  return `${time}-${messageId.replaceAll(/[^\w-]+/g, '-').replaceAll(/^-|-$/g, '')}`;
}

const readable = (mail: OutgoingMail, from: string) =>
  `From: ${from}\nTo: ${mail.to}\nDate: ${mail.date.toISOString()}\nSubject: ${mail.subject}\n\n${mail.text}`;

/** Whoever looks into the folder sees a file whole or not at all. */
async function writeWhole(file: string, content: Buffer | string): Promise<void> {
  await writeFile(`${file}.part`, content, { mode: 0o600 });
  await rename(`${file}.part`, file);
}

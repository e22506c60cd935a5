import { mkdtemp, readdir, readFile, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { type ParsedMail, simpleParser } from 'mailparser';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { MailerPort, OutgoingMail } from '#server/mail/mailer-port.ts';
import { createMemoryMailer } from '#server/mail/memory-mailer.ts';
import { createOutboxFolderMailer } from '#server/mail/outbox-folder-mailer.ts';
import { createSmtpMailer } from '#server/mail/smtp-mailer.ts';
import { startSmtpStandIn } from '#tests/support/smtp-stand-in.ts';

const FROM = 'Tracehead <tracehead@harrow-fen.example>';
const mail = (n: number): OutgoingMail => ({
  messageId: `<0190-${n}@tracehead.test>`,
  to: 'remi.okafor@harrow-fen.example',
  subject: 'For checking: Section B–B, γw 9.81 kN/m³',
  text: 'Pore pressure\n.\nat P1 — 112.4 kPa\n',
  html: '<p>Pore pressure — 112.4 kPa</p>',
  date: new Date('2026-12-01T09:00:00Z'),
});

interface Delivered {
  messageId: string | undefined;
  subject: string | undefined;
  text: string | undefined;
}
interface Rig {
  mailer: MailerPort;
  delivered(): Promise<Delivered[]>;
  close(): Promise<void>;
}
const fromParsed = ({ messageId, subject, text }: ParsedMail): Delivered => ({ messageId, subject, text });

const rigs: Record<string, () => Promise<Rig>> = {
  async 'a mail server'() {
    const server = await startSmtpStandIn();
    const mailer = createSmtpMailer({ smtpUrl: server.url, from: FROM });
    return { mailer, delivered: async () => server.received.map(fromParsed), close: server.close };
  },
  async 'the outbox folder'() {
    const folder = await mkdtemp(path.join(os.tmpdir(), 'tracehead-outbox-'));
    const mailer = createOutboxFolderMailer({ folder: path.join(folder, 'outbox'), from: FROM });
    const delivered = async () => {
      const names = (await readdir(path.join(folder, 'outbox'))).filter((name) => name.endsWith('.eml'));
      const files = names.sort().map((name) => readFile(path.join(folder, 'outbox', name)));
      return (await Promise.all((await Promise.all(files)).map((file) => simpleParser(file)))).map(
        fromParsed,
      );
    };
    return { mailer, delivered, close: () => rm(folder, { recursive: true }) };
  },
  async memory() {
    const mailer = createMemoryMailer();
    return { mailer, delivered: async () => mailer.sent, close: async () => {} };
  },
};

describe.each(Object.keys(rigs))('mail through %s', (name) => {
  let rig: Rig;
  beforeAll(async () => {
    rig = await (rigs[name] as () => Promise<Rig>)();
  });
  afterAll(async () => {
    rig.mailer.close();
    await rig.close();
  });

  it('arrives under its own Message-ID, with subject and text as written', async () => {
    await rig.mailer.send(mail(1));
    const [first] = await rig.delivered();
    expect(first?.messageId).toBe('<0190-1@tracehead.test>');
    expect(first?.subject).toBe('For checking: Section B–B, γw 9.81 kN/m³');
    expect(first?.text?.replaceAll('\r\n', '\n').trim()).toBe('Pore pressure\n.\nat P1 — 112.4 kPa');
  });

  it('arrives in the order it was handed over', async () => {
    await rig.mailer.send(mail(2));
    await rig.mailer.send(mail(3));
    const ids = (await rig.delivered()).map((each) => each.messageId);
    expect(ids.slice(-2)).toEqual(['<0190-2@tracehead.test>', '<0190-3@tracehead.test>']);
  });
});

describe('a mail server that refuses or is away', () => {
  it('is told as an error with its own words', async () => {
    const server = await startSmtpStandIn();
    server.refuse(1, 451, 'greylisted, come back later');
    const mailer = createSmtpMailer({ smtpUrl: server.url, from: FROM });
    await expect(mailer.send(mail(1))).rejects.toThrow(/greylisted/);
    await server.close();
    await expect(mailer.send(mail(1))).rejects.toThrow(/ECONNREFUSED/);
    mailer.close();
  });
});

describe('the outbox folder', () => {
  it('holds a readable text beside each mail and replaces what is sent twice', async () => {
    const folder = await mkdtemp(path.join(os.tmpdir(), 'tracehead-outbox-'));
    const mailer = createOutboxFolderMailer({ folder, from: FROM });
    await mailer.send(mail(1));
    await mailer.send(mail(1));
    const names = await readdir(folder);
    expect(names.sort()).toEqual([
      '2026-12-01T09-00-00-000Z-0190-1-tracehead-test.eml',
      '2026-12-01T09-00-00-000Z-0190-1-tracehead-test.txt',
    ]);
    const text = await readFile(path.join(folder, names[1] as string), 'utf8');
    expect(text).toContain('To: remi.okafor@harrow-fen.example');
    expect(text).toContain('112.4 kPa');
    await rm(folder, { recursive: true });
  });
});

describe('mail in memory', () => {
  it('fails once when told to', async () => {
    const mailer = createMemoryMailer();
    mailer.failNext(new Error('no stamps'));
    await expect(mailer.send(mail(1))).rejects.toThrow('no stamps');
    await mailer.send(mail(1));
    expect(mailer.sent).toHaveLength(1);
  });
});

import { mkdtemp, readdir, readFile, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { type ParsedMail, simpleParser } from 'mailparser';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type MailerPort, MailRefused, type OutgoingMail } from '#server/mail/mailer-port.ts';
import { createMemoryMailer } from '#server/mail/memory-mailer.ts';
import { createOutboxFolderMailer } from '#server/mail/outbox-folder-mailer.ts';
import { createSmtpMailer } from '#server/mail/smtp-mailer.ts';
import { startSmtpStandIn } from '#tests/support/smtp-stand-in.ts';

const FROM = 'Tracehead <tracehead@harrow-fen.example>';
const JPEG = Buffer.from('/9j/4AAQ', 'base64');
/** Longer than a header's line may be before it is folded. */
const STOP_URL = `https://tracehead.test/api/v1/digest-stops?token=${'a'.repeat(36)}.${'b'.repeat(43)}`;
const mail = (n: number): OutgoingMail => ({
  messageId: `<0190-${n}@tracehead.test>`,
  to: 'remi.okafor@harrow-fen.example',
  subject: 'For checking: Section B–B, γw 9.81 kN/m³',
  text: 'Pore pressure\n.\nat P1 — 112.4 kPa\n',
  html: '<p>Pore pressure — 112.4 kPa</p><img src="cid:section-1@tracehead.test" alt="Section">',
  pictures: [{ contentId: 'section-1@tracehead.test', fileName: 'section.jpg', jpeg: JPEG }],
  stopUrl: n === 1 ? STOP_URL : null,
  date: new Date('2026-12-01T09:00:00Z'),
});

interface Delivered {
  messageId: string | undefined;
  subject: string | undefined;
  text: string | undefined;
}
/** What a mail carries beside its texts, where it goes over a wire. */
interface Carried {
  unsubscribe: string | undefined;
  oneClick: string | undefined;
  pictures: Array<{ cid: string | undefined; content: Buffer; isInline: boolean }>;
}
const lineOf = ({ headerLines }: ParsedMail, key: string) =>
  headerLines.find((header) => header.key === key)?.line.replaceAll(/\r?\n\s+/g, ' ');
const carriedBy = (mail: ParsedMail): Carried => ({
  unsubscribe: lineOf(mail, 'list-unsubscribe'),
  oneClick: lineOf(mail, 'list-unsubscribe-post'),
  pictures: mail.attachments.map(({ cid, content, contentDisposition }) => ({
    cid,
    content,
    isInline: contentDisposition === 'inline',
  })),
});
interface Rig {
  mailer: MailerPort;
  delivered(): Promise<Delivered[]>;
  carried?: () => Promise<Carried[]>;
  close(): Promise<void>;
}
const fromParsed = ({ messageId, subject, text }: ParsedMail): Delivered => ({ messageId, subject, text });

const rigs: Record<string, () => Promise<Rig>> = {
  async 'a mail server'() {
    const server = await startSmtpStandIn();
    const mailer = createSmtpMailer({ smtpUrl: server.url, from: FROM });
    return {
      mailer,
      delivered: async () => server.received.map(fromParsed),
      carried: async () => server.received.map(carriedBy),
      close: server.close,
    };
  },
  async 'the outbox folder'() {
    const folder = await mkdtemp(path.join(os.tmpdir(), 'tracehead-outbox-'));
    const mailer = createOutboxFolderMailer({ folder: path.join(folder, 'outbox'), from: FROM });
    const parsed = async () => {
      const names = (await readdir(path.join(folder, 'outbox'))).filter((name) => name.endsWith('.eml'));
      const files = names.sort().map((name) => readFile(path.join(folder, 'outbox', name)));
      return Promise.all((await Promise.all(files)).map((file) => simpleParser(file)));
    };
    return {
      mailer,
      delivered: async () => (await parsed()).map(fromParsed),
      carried: async () => (await parsed()).map(carriedBy),
      close: () => rm(folder, { recursive: true }),
    };
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

  it('brings its picture with it, and names what stops it where there is something to stop', async () => {
    if (!rig.carried) return;
    await rig.mailer.send(mail(1));
    await rig.mailer.send(mail(2));
    const [digest, other] = (await rig.carried()).slice(-2);
    expect(digest?.unsubscribe).toBe(`List-Unsubscribe: <${STOP_URL}>`);
    expect(digest?.oneClick).toBe('List-Unsubscribe-Post: List-Unsubscribe=One-Click');
    expect(other).toMatchObject({ unsubscribe: undefined, oneClick: undefined });
    expect(digest?.pictures).toEqual([{ cid: 'section-1@tracehead.test', content: JPEG, isInline: true }]);
  });

  it('arrives in the order it was handed over', async () => {
    await rig.mailer.send(mail(3));
    await rig.mailer.send(mail(4));
    const ids = (await rig.delivered()).map((each) => each.messageId);
    expect(ids.slice(-2)).toEqual(['<0190-3@tracehead.test>', '<0190-4@tracehead.test>']);
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

  it('refuses for good by 5yz to the recipient or the mail, and only then', async () => {
    const server = await startSmtpStandIn();
    const mailer = createSmtpMailer({ smtpUrl: server.url, from: FROM });
    const failure = () => mailer.send(mail(1)).catch((error: unknown) => error);
    server.refuse(1, 554, 'no such content here');
    expect(await failure()).toBeInstanceOf(MailRefused);
    server.refuse(1, 452, 'the mailbox is full');
    expect(await failure()).not.toBeInstanceOf(MailRefused);
    server.refuseAt('recipient', 550, 'no such mailbox');
    const unknown = await failure();
    expect(unknown).toBeInstanceOf(MailRefused);
    expect(String(unknown)).toContain('no such mailbox');
    server.refuseAt('recipient', 451, 'greylisted');
    expect(await failure()).not.toBeInstanceOf(MailRefused);
    // The sender is the same for every mail: a fault of the settings.
    server.refuseAt('sender', 550, 'we do not know you');
    expect(await failure()).not.toBeInstanceOf(MailRefused);
    mailer.close();
    await server.close();
  });

  it('that falls silent is given up after a while', async () => {
    const server = await startSmtpStandIn();
    const patience = { connectMs: 300, silenceMs: 300 };
    const mailer = createSmtpMailer({ smtpUrl: server.url, from: FROM, patience });
    server.stallAt('recipient');
    await expect(mailer.send(mail(1))).rejects.toThrow(/timeout/i);
    server.stallAt('end');
    await expect(mailer.send(mail(1))).rejects.toThrow(/timeout/i);
    await mailer.send(mail(2));
    // The second was taken, only nobody was told: a repeat has the same Message-ID.
    expect(server.received.map(({ messageId }) => messageId)).toEqual([
      '<0190-1@tracehead.test>',
      '<0190-2@tracehead.test>',
    ]);
    mailer.close();
    await server.close();
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

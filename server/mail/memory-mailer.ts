import type { MailerPort, OutgoingMail } from './mailer-port.ts';

export interface MemoryMailer extends MailerPort {
  /** What was sent, in order. */
  sent: OutgoingMail[];
  /** Makes the next `send` fail. */
  failNext(error: Error): void;
}

/** Mail that goes nowhere, for tests about what is mailed rather than about mailing. */
export function createMemoryMailer(): MemoryMailer {
  const sent: OutgoingMail[] = [];
  let failure: Error | null = null;
  return {
    sent,
    failNext(error) {
      failure = error;
    },
    async send(mail) {
      const thrown = failure;
      failure = null;
      if (thrown) throw thrown;
      sent.push(mail);
    },
    close() {},
  };
}

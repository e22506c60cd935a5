import type { AddressInfo } from 'node:net';
import { type ParsedMail, simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';

export interface SmtpStandIn {
  /** For SMTP_URL. */
  url: string;
  /** What was delivered, in order. */
  received: ParsedMail[];
  /** Refuses the next deliveries with this code and text. */
  refuse(times: number, code: number, text: string): void;
  /** Calls this after each delivery, before the sender is told. */
  onReceived(listener: (mail: ParsedMail) => void): void;
  close(): Promise<void>;
}

/** A real SMTP server on loopback that keeps what it is given. */
export async function startSmtpStandIn({ port = 0 } = {}): Promise<SmtpStandIn> {
  const received: ParsedMail[] = [];
  const refusals: Array<{ code: number; text: string }> = [];
  let tell: (mail: ParsedMail) => void = () => {};
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onData(stream, _session, callback) {
      simpleParser(stream).then((mail) => {
        const refusal = refusals.shift();
        if (refusal) {
          callback(Object.assign(new Error(refusal.text), { responseCode: refusal.code }));
          return;
        }
        received.push(mail);
        tell(mail);
        callback();
      }, callback);
    },
  });
  // A client that goes away in the middle is part of what is tested.
  server.on('error', () => {});
  await new Promise<void>((resolve) => server.listen(port, '127.0.0.1', () => resolve()));
  const address = server.server.address() as AddressInfo;
  return {
    url: `smtp://127.0.0.1:${address.port}`,
    received,
    refuse(times, code, text) {
      for (let n = 0; n < times; n++) refusals.push({ code, text });
    },
    onReceived(listener) {
      tell = listener;
    },
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
}

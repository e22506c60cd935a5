import type { AddressInfo } from 'node:net';
import { type ParsedMail, simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';

/** Steps of a delivery: the server is told the sender, the recipient, and has the whole mail. */
export type SmtpStep = 'sender' | 'recipient' | 'end';

export interface SmtpStandIn {
  /** For SMTP_URL. */
  url: string;
  /** What was delivered, in order. */
  received: ParsedMail[];
  /** Refuses the next deliveries with this code and text. */
  refuse(times: number, code: number, text: string): void;
  /** Refuses once at a step. */
  refuseAt(step: SmtpStep, code: number, text: string): void;
  /** Never answers at a step, once; resolves when the sender waits there. At the end the mail has been kept. */
  stallAt(step: SmtpStep): Promise<void>;
  /** Calls this after each delivery, and tells the sender once it has ended. */
  onReceived(listener: (mail: ParsedMail) => void | Promise<void>): void;
  close(): Promise<void>;
}

type Answer = (error?: Error | null) => void;

/** A real SMTP server on loopback that keeps what it is given. */
export async function startSmtpStandIn({ port = 0 } = {}): Promise<SmtpStandIn> {
  const received: ParsedMail[] = [];
  const refusals = new Map<SmtpStep, Error[]>();
  const stalls = new Map<SmtpStep, () => void>();
  let tell: (mail: ParsedMail) => void | Promise<void> = () => {};

  function answer(step: SmtpStep, callback: Answer): void {
    const reached = stalls.get(step);
    stalls.delete(step);
    if (reached) reached();
    else callback(refusals.get(step)?.shift());
  }
  const addRefusal = (step: SmtpStep, code: number, text: string) => {
    const error = Object.assign(new Error(text), { responseCode: code });
    refusals.set(step, [...(refusals.get(step) ?? []), error]);
  };

  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onMailFrom: (_address, _session, callback) => answer('sender', callback),
    onRcptTo: (_address, _session, callback) => answer('recipient', callback),
    onData(stream, _session, callback) {
      simpleParser(stream)
        .then((mail) => {
          if (refusals.get('end')?.length) return answer('end', callback);
          received.push(mail);
          return Promise.resolve(tell(mail)).then(() => answer('end', callback));
        })
        .catch(callback);
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
      for (let n = 0; n < times; n++) addRefusal('end', code, text);
    },
    refuseAt: addRefusal,
    stallAt: (step) =>
      new Promise((resolve) => {
        stalls.set(step, resolve);
      }),
    onReceived(listener) {
      tell = listener;
    },
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
}

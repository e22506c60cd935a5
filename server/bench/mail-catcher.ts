import type { AddressInfo } from 'node:net';
import { SMTPServer } from 'smtp-server';

/** A mail server on this machine that keeps nothing but when the last byte of a mail came, and its size. */
export interface MailCatcher {
  url: string;
  /** When the next mail is there whole, by `performance.now()`. */
  next(): Promise<number>;
  lastBytes(): number;
  close(): Promise<void>;
}

export async function startMailCatcher(): Promise<MailCatcher> {
  let bytes = 0;
  let arrived: (at: number) => void = () => {};
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onData(stream, _session, callback) {
      let size = 0;
      stream.on('data', (chunk: Buffer) => {
        size += chunk.length;
      });
      stream.on('end', () => {
        bytes = size;
        arrived(performance.now());
        callback();
      });
    },
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', () => resolve()));
  return {
    url: `smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`,
    next: () =>
      new Promise((resolve) => {
        arrived = resolve;
      }),
    lastBytes: () => bytes,
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
}

import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { createReadingClient } from './reading-client.ts';
import type { ReadingPort } from './reading-port.ts';

/**
 * Reads a document once, in a worker of its own that ends with it; a reading that is given up ends its worker at once.
 * @throws Error when the worker fails, and the signal's reason when it is given up
 */
export function readOnce(
  document: FlowNetDocument,
  signal: AbortSignal,
  reader: ReadingPort = createReadingClient(),
): Promise<NetReading> {
  return new Promise<NetReading>((resolve, reject) => {
    if (signal.aborted) return reject(signal.reason);
    signal.addEventListener('abort', () => reject(signal.reason), { once: true });
    reader.onAnswer((_revision, reading) =>
      reading === null ? reject(new Error('The net could not be read.')) : resolve(reading),
    );
    reader.ask(document, 0);
  }).finally(() => reader.close());
}

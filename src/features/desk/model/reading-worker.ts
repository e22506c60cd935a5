import { createNetReader } from '#shared/compute/net-reader.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** Question to the worker and its answer. */
export type ReadingQuestion = { readonly revision: number; readonly document: FlowNetDocument };
export type ReadingAnswer = { readonly revision: number; readonly reading: NetReading };

const scope = globalThis as unknown as DedicatedWorkerGlobalScope;
const reader = createNetReader();

scope.onmessage = (event: MessageEvent<ReadingQuestion>) => {
  const { revision, document } = event.data;
  const answer: ReadingAnswer = { revision, reading: reader.read(document) };
  scope.postMessage(answer);
};

import { createNetReader } from '#shared/compute/net-reader.ts';
import type { PointsRead } from '#shared/compute/reread-points.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** Question to the worker and its answer, ahead of which the points may be told. */
export type ReadingQuestion = { readonly revision: number; readonly document: FlowNetDocument };
export type ReadingAnswer = { readonly revision: number; readonly reading: NetReading };
export type PointsAhead = { readonly revision: number; readonly points: PointsRead };

const scope = globalThis as unknown as DedicatedWorkerGlobalScope;
const reader = createNetReader();

scope.onmessage = (event: MessageEvent<ReadingQuestion>) => {
  const { revision, document } = event.data;
  const points = reader.readPoints(document);
  if (points !== null) scope.postMessage({ revision, points } satisfies PointsAhead);
  scope.postMessage({ revision, reading: reader.read(document) } satisfies ReadingAnswer);
};

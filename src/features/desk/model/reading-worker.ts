import type { HeadAtPlace } from '#shared/compute/net/head-at-place.ts';
import { poorPlacesOf } from '#shared/compute/net-check/poor-places.ts';
import { createNetReader } from '#shared/compute/net-reader.ts';
import type { PointsRead } from '#shared/compute/reread-points.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** Question to the worker and its answer, ahead of which the points may be told. */
export type ReadingQuestion = { readonly revision: number; readonly document: FlowNetDocument };
/** Where a head is wanted by the net that was read last. */
export type HeadQuestion = { readonly place: SheetPoint };
/** Of the check of the net only the poor places: the page shows no others. */
export type ReadingAnswer = { readonly revision: number; readonly reading: NetReading };
export type PointsAhead = { readonly revision: number; readonly points: PointsRead };
/** `of`: revision of the document that was read last. */
export type HeadAnswer = { readonly of: number; readonly head: HeadAtPlace | null };
export type WorkerQuestion = ReadingQuestion | HeadQuestion;
export type WorkerAnswer = ReadingAnswer | PointsAhead | HeadAnswer;

const scope = globalThis as unknown as DedicatedWorkerGlobalScope;
const reader = createNetReader();
let lastRead = -1;

scope.onmessage = ({ data }: MessageEvent<WorkerQuestion>) => {
  if ('place' in data) {
    scope.postMessage({ of: lastRead, head: reader.headAt(data.place) } satisfies HeadAnswer);
    return;
  }
  const { revision, document } = data;
  const points = reader.readPoints(document);
  if (points !== null) scope.postMessage({ revision, points } satisfies PointsAhead);
  scope.postMessage({ revision, reading: withPoorPlaces(reader.read(document)) } satisfies ReadingAnswer);
  lastRead = revision;
};

function withPoorPlaces(reading: NetReading): NetReading {
  return { ...reading, netCheck: reading.netCheck && poorPlacesOf(reading.netCheck) };
}

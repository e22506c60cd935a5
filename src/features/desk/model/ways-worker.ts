import { type PointWays, pointWays } from '#shared/compute/net/point-ways.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';

export type WaysQuestion = { readonly document: FlowNetDocument; readonly pointId: string };
export type WaysAnswer = PointWays | null;

const scope = globalThis as unknown as DedicatedWorkerGlobalScope;

scope.onmessage = (event: MessageEvent<WaysQuestion>) => {
  const answer: WaysAnswer = pointWays(event.data.document, event.data.pointId);
  scope.postMessage(answer);
};

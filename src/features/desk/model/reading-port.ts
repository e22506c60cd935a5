import type { HeadAtPlace } from '#shared/compute/net/head-at-place.ts';
import type { PointsRead } from '#shared/compute/reread-points.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** Works out the reading of a document off the main thread. */
export type ReadingPort = {
  /**
   * Asks for the reading of a document; only the newest question is sure to be answered. `revision` names the
   * document in the answer.
   */
  ask(document: FlowNetDocument, revision: number): void;
  /** Is told each answer; a failure carries no reading. Gives a function that ends it. */
  onAnswer(listener: (revision: number, reading: NetReading | null) => void): () => void;
  /** Is told the points where they are read ahead of the answer that follows. Gives a function that ends it. */
  onPoints(listener: (revision: number, points: PointsRead) => void): () => void;
  /**
   * Asks for the head at a place of the sheet by the net read last, `of` that revision; null where it gives none. Only
   * the newest question is sure to be answered: an older one that still waits is answered with null at once.
   */
  headAt(place: SheetPoint): Promise<HeadRead | null>;
  close(): void;
};

export type HeadRead = { readonly of: number; readonly head: HeadAtPlace | null };

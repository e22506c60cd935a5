import type { PointsRead } from '#shared/compute/reread-points.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
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
  close(): void;
};

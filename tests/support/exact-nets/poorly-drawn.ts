import type { ExactNet } from '#shared/compute/exact/exact-net.ts';
import { similarityBackward } from '#shared/compute/similarity.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import { withLines } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument, sheetMapOf, type Tracing } from '#tests/support/exact-nets/exact-net-document.ts';

const VERTICES = 40;

/**
 * An exact net of which one inner flow line, the `index`th, is drawn through `channel` between its ends: the cells
 * beside it are not square, and the head lines are right.
 */
export function withFlowLineMoved(
  net: ExactNet,
  tracing: Tracing,
  index: number,
  channel: number,
): FlowNetDocument {
  const map = sheetMapOf(net, tracing);
  const at = (drops: number, channels: number): SheetPoint => {
    const [x, y] = similarityBackward(map, ...net.placeAt(drops, channels));
    return [x, y];
  };
  return withLines(exactNetDocument(net, tracing), 'flowLine', (value, i) => {
    if (i !== index) return value;
    const points = Array.from({ length: VERTICES + 1 }, (_, k) => at((net.drops * k) / VERTICES, channel));
    return { ...value, points };
  });
}

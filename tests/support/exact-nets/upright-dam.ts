import type { FlowNetDocument } from '#shared/contract/document.ts';
import { sketchedNet } from '#tests/support/exact-nets/sketched-net.ts';

/**
 * The outline of a dam with upright faces, 10 m thick, with 10 m of water against it, that drains freely down its
 * downstream face: published case 2-12 (Dupuit 1863; Charny 1951), q = kh²/2L. Drawn with the small gaps and overshoots
 * of a hand.
 */
export function uprightDam(): FlowNetDocument {
  return sketchedNet(
    [
      {
        line: 'submergedFace',
        water: 'headwater',
        through: [
          [0, 0],
          [0, 10],
        ],
      },
      {
        line: 'ground',
        through: [
          [0, 9.98],
          [0, 11],
          [10, 11],
        ],
      },
      {
        line: 'outflowFace',
        through: [
          [10.02, 11],
          [10, 0],
        ],
      },
      {
        line: 'impervious',
        through: [
          [-0.03, 0],
          [10.03, 0],
        ],
      },
    ],
    { headwater: 10, tailwater: null, drops: null },
  );
}

import { basicParabolaNet } from '#shared/compute/exact/basic-parabola-net.ts';
import type { ExactNet } from '#shared/compute/exact/exact-net.ts';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import { sheetPileNet } from '#shared/compute/exact/sheet-pile-net.ts';

/** The three exact nets against which readings are held, with the pixels to a metre that fill a 5,000 px sheet. */
export const EXACT_NETS: ReadonlyArray<{ name: string; net: ExactNet; pxPerUnit: number }> = [
  {
    name: 'basic parabola (Kozeny 1931)',
    net: basicParabolaNet({ head: 20, drops: 10, channels: 3, focus: [14, 98] }),
    pxPerUnit: 110,
  },
  {
    name: 'flat apron on level ground (Pavlovsky 1922, Harr 1962)',
    net: flatApronNet({
      width: 20,
      headwater: 106,
      tailwater: 100,
      drops: 12,
      channels: 7,
      middle: [0, 98],
    }),
    pxPerUnit: 55,
  },
  {
    name: 'sheet pile in a half-space (Harr 1962)',
    net: sheetPileNet({ depth: 10, headwater: 104, tailwater: 100, drops: 10, channels: 4, head: [0, 99] }),
    pxPerUnit: 90,
  },
];

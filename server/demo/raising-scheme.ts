import { Pen } from './pen.ts';
import { pxPerMetreAt, type SheetFrame } from './sheet-frame.ts';

const frame: SheetFrame = {
  widthPx: 3200,
  heightPx: 2100,
  pxPerMetre: pxPerMetreAt(750, 300),
  skewDeg: -1.3,
  origin: [1580, 1380],
  datumElevation: 98,
};

export const raisingFrame = frame;

/** Drawing HF-131, a raising that was designed and not built: three heights of crest on three pages. */
export function drawRaisingScheme(page: number): string {
  const pen = new Pen(frame, 131 + page);
  const crest = 122 + page * 1.5;
  const upstreamToe = -13 - 2.2 * (crest - 98);
  pen.line(
    [
      [-92, 98],
      [92, 98],
    ],
    { width: 3 },
  );
  pen.line(
    [
      [-65.8, 98],
      [-13, 122],
      [-3, 122],
      [45, 98],
    ],
    { width: 2, dash: [14, 9] },
  );
  pen.line(
    [
      [upstreamToe, 98],
      [-13, crest],
      [-3, crest],
      [-3 + 2.4 * (crest - 98), 98],
    ],
    { width: 4 },
  );
  pen.text(`RAISING SCHEME, STAGE ${page}`, [-92, 138], 3, { width: 4 });
  pen.text('SCALE 1 : 750   DRG. HF-131 A', [-92, 133.6], 1.8);
  pen.text(`CREST ${crest.toFixed(2)}`, [-14, crest + 2], 1.7);
  pen.text('98.00', [78, 99.2], 1.6);
  pen.hatch(-90, 90, 97.6, 4, 3.6);
  pen.line(
    [
      [-98, 78],
      [98, 78],
      [98, 144],
      [-98, 144],
      [-98, 78],
    ],
    { width: 3 },
  );
  return pen.svg();
}

import { type FlatApron, flatApronPoint } from '#shared/compute/exact/flat-apron.ts';
import { Pen } from './pen.ts';
import { pxPerMetreAt, type SheetFrame } from './sheet-frame.ts';

/** Harrow Fen Dam, spillway apron on level ground over deep sand: confocal ellipses and hyperbolas are exact. */
export const GROUND = 96;
export const HEADWATER = 104;
export const TAILWATER = 98;
export const DROPS = 12;
export const CHANNELS = 7;

export const underseepage: FlatApron = { b: 20, H: HEADWATER - TAILWATER };

export const spillwayFrame: SheetFrame = {
  widthPx: 4200,
  heightPx: 2900,
  pxPerMetre: pxPerMetreAt(300, 300),
  skewDeg: 0.9,
  origin: [2090, 1250],
  datumElevation: GROUND,
};

/** Offset (growing downstream) and elevation of the net's node: head above tailwater and flow line v. */
export function apronPoint(head: number, v: number): [number, number] {
  const [x, depth] = flatApronPoint(underseepage, head, v);
  return [x, GROUND - depth];
}

const outermost = (CHANNELS * Math.PI) / DROPS;

export const apronEquipotential = (drop: number, pieces = 40): Array<[number, number]> =>
  Array.from({ length: pieces + 1 }, (_, index) =>
    apronPoint(underseepage.H * (1 - drop / DROPS), (outermost * index) / pieces),
  );

export const apronFlowLine = (channel: number, pieces = 72): Array<[number, number]> =>
  Array.from({ length: pieces + 1 }, (_, index) =>
    apronPoint(underseepage.H * (1 - index / pieces), (channel * Math.PI) / DROPS),
  );

/** Bed upstream or downstream of the apron, from its end to where the outermost flow line leaves the ground. */
export function bedOf(side: 'upstream' | 'downstream'): Array<[number, number]> {
  const sign = side === 'upstream' ? -1 : 1;
  const half = underseepage.b / 2;
  return [
    [sign * half * Math.cosh(outermost), GROUND],
    [sign * half, GROUND],
  ];
}

function drawStructure(pen: Pen): void {
  pen.line(
    [
      [-44, GROUND],
      [-10, GROUND],
    ],
    { width: 3.4 },
  );
  pen.line(
    [
      [10, GROUND],
      [44, GROUND],
    ],
    { width: 3.4 },
  );
  pen.line(
    [
      [-10, GROUND],
      [10, GROUND],
      [10, GROUND + 1.2],
      [-5.6, GROUND + 1.2],
      [-6.4, 102.4],
      [-10, 102.4],
      [-10, GROUND],
    ],
    { width: 4 },
  );
  pen.line(
    [
      [-44, HEADWATER],
      [-10, HEADWATER],
    ],
    { width: 2 },
  );
  pen.line(
    [
      [10.4, TAILWATER],
      [44, TAILWATER],
    ],
    { width: 2 },
  );
  pen.line(
    [
      [-9.2, 102.4],
      [-9.2, 104.6],
      [-7.4, 104.6],
      [-7.4, 102.4],
    ],
    { width: 3 },
  );
}

function drawLettering(pen: Pen): void {
  pen.text('SPILLWAY APRON, FLOW NET', [-44, 118.6], 1.8, { width: 4 });
  pen.text('SCALE 1 : 300   DRG. HF-120', [-44, 116], 1.05);
  pen.text('F.S.L. 104.00', [-42, 104.6], 0.9);
  pen.text('T.W.L. 98.00', [32, 98.6], 0.9);
  pen.text('SAND', [26, 72], 1);
  pen.text('96.00', [-38, 96.5], 0.9);
  for (const offset of [-40, 40]) {
    pen.line(
      [
        [offset, GROUND - 0.9],
        [offset, GROUND + 0.9],
      ],
      { width: 2 },
    );
    pen.text(offset < 0 ? '40.0 U/S' : '40.0 D/S', [offset - 1.6, GROUND - 3.4], 0.85);
  }
  pen.line(
    [
      [-47, 60],
      [47, 60],
      [47, 122],
      [-47, 122],
      [-47, 60],
    ],
    { width: 3 },
  );
}

/** The drawing of the apron with its designer's flow net. */
export function drawSpillwayApron(): string {
  const pen = new Pen(spillwayFrame, 120);
  drawStructure(pen);
  drawLettering(pen);
  for (let drop = 1; drop < DROPS; drop += 1) pen.line(apronEquipotential(drop), { width: 1.8 });
  for (let channel = 1; channel <= CHANNELS; channel += 1) pen.line(apronFlowLine(channel), { width: 1.8 });
  return pen.svg();
}

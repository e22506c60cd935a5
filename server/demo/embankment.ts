import { type BasicParabola, basicParabolaPoint } from '#shared/compute/exact/basic-parabola.ts';
import { Pen } from './pen.ts';
import { pxPerMetreAt, type SheetFrame } from './sheet-frame.ts';

/**
 * Harrow Fen Dam, Section B–B: an earth body behind a free-draining upstream shell. The body's upstream face is
 * the parabola for which the basic parabola is exact, so the figures of the demo's finished net are right.
 */
export const BASE = 98;
export const FULL_SUPPLY = 118;
const CREST = 122;
/** Offset of the focus, where the gravel blanket begins; offsets grow downstream. */
const FOCUS = 20;
const DOWNSTREAM_TOE = 45;

export const seepage: BasicParabola = { S: 6, H: FULL_SUPPLY - BASE };

export const sectionBB: SheetFrame = {
  widthPx: 4400,
  heightPx: 1820,
  pxPerMetre: pxPerMetreAt(400, 300),
  skewDeg: 1.1,
  origin: [2495, 1235],
  datumElevation: BASE,
};

/** Offset and elevation where the line of head `head` above the base meets the flow line at `channel` (0…1). */
export function netPoint(head: number, channel: number): [number, number] {
  const [x, y] = basicParabolaPoint(seepage, head, channel);
  return [FOCUS - x, BASE + y];
}

/** Points of one line of the net, from the base to the phreatic line. */
export const equipotentialAt = (head: number, pieces = 24): Array<[number, number]> =>
  Array.from({ length: pieces + 1 }, (_, index) => netPoint(head, index / pieces));

/** Points of one flow line, from the upstream face to the blanket; closer together near the drain. */
export const flowLineAt = (channel: number, pieces = 60): Array<[number, number]> =>
  Array.from({ length: pieces + 1 }, (_, index) => netPoint(seepage.H * (1 - index / pieces), channel));

function drawEarthworks(pen: Pen): void {
  const face = equipotentialAt(seepage.H, 12);
  pen.line(
    [
      [-65.8, BASE],
      [-13, CREST],
      [-3, CREST],
      [DOWNSTREAM_TOE, BASE],
    ],
    { width: 4 },
  );
  pen.line([...face, [-9, CREST]], { width: 3, dash: [26, 10] });
  pen.line(
    [
      [-78, BASE],
      [58, BASE],
    ],
    { width: 3 },
  );
  pen.line(
    [
      [FOCUS, BASE],
      [FOCUS, BASE - 1.4],
      [DOWNSTREAM_TOE, BASE - 1.4],
    ],
    { width: 2.2, dash: [14, 10] },
  );
  pen.hatch(-76, FOCUS, BASE - 0.3, 3.4, 2.2);
}

function drawWater(pen: Pen): void {
  pen.line(
    [
      [-78, FULL_SUPPLY],
      [-21.8, FULL_SUPPLY],
    ],
    { width: 2 },
  );
  pen.line(
    [
      [-21.8, FULL_SUPPLY],
      [-10.5, FULL_SUPPLY],
    ],
    { width: 1.6, dash: [10, 10] },
  );
  pen.line(
    [
      [-73, FULL_SUPPLY + 1.4],
      [-72, FULL_SUPPLY],
      [-71, FULL_SUPPLY + 1.4],
      [-73, FULL_SUPPLY + 1.4],
    ],
    { width: 2 },
  );
}

function drawLettering(pen: Pen, title: string): void {
  pen.text(title, [-78, 130], 2.2, { width: 4 });
  pen.text('SCALE 1 : 400   DRG. HF-114 C', [-78, 126.8], 1.3);
  pen.text('F.S.L. 118.00', [-69, FULL_SUPPLY + 0.8], 1.2);
  pen.text('CREST 122.00', [-12, CREST + 1.2], 1.2);
  pen.text('ROCKFILL, FREE DRAINING', [-46, 102], 1.1);
  pen.text('EARTH', [0.5, 115.4], 1);
  pen.text('GRAVEL BLANKET, TOP 98.00', [22, 95], 1.1);
  pen.text('BLUE CLAY', [-40, 92.4], 1.1);
}

function drawSetting(pen: Pen): void {
  for (const offset of [-70, 50]) {
    pen.line(
      [
        [offset, BASE - 1.6],
        [offset, BASE + 1.6],
      ],
      { width: 2 },
    );
    pen.text(offset < 0 ? '70.0 U/S' : '50.0 D/S', [offset - 3.2, BASE + 2.2], 1);
  }
  pen.line(
    [
      [-78, 89],
      [-38, 89],
    ],
    { width: 2.4 },
  );
  for (let metre = 0; metre <= 40; metre += 10)
    pen.line(
      [
        [-78 + metre, 88.4],
        [-78 + metre, 89.6],
      ],
      { width: 2 },
    );
  pen.text('0', [-78.4, 86.2], 1.1);
  pen.text('40 M', [-40, 86.2], 1.1);
  pen.line(
    [
      [-81, 84.4],
      [61, 84.4],
      [61, 134],
      [-81, 134],
      [-81, 84.4],
    ],
    { width: 3 },
  );
}

/** The drawing of Section B–B with the flow net its designer drew on it. */
export function drawSectionBB(): string {
  const pen = new Pen(sectionBB, 114);
  drawEarthworks(pen);
  drawWater(pen);
  drawLettering(pen, 'SECTION B - B   CHAINAGE 212');
  drawSetting(pen);
  for (let drop = 1; drop <= 9; drop += 1)
    pen.line(equipotentialAt(seepage.H * (1 - drop / 10)), { width: 1.8 });
  for (const channel of [1 / 3, 2 / 3]) pen.line(flowLineAt(channel), { width: 1.8 });
  pen.line(flowLineAt(1), { width: 2.6, dash: [20, 8] });
  return pen.svg();
}

export const sectionCC: SheetFrame = { ...sectionBB, skewDeg: -0.7, origin: [2480, 1240] };

/** Section C–C, of the same shape nearer the abutment; no net was ever drawn on it. */
export function drawSectionCC(): string {
  const pen = new Pen(sectionCC, 305);
  drawEarthworks(pen);
  drawWater(pen);
  drawLettering(pen, 'SECTION C - C   CHAINAGE 305');
  drawSetting(pen);
  return pen.svg();
}

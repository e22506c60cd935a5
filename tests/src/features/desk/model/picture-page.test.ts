import { describe, expect, it } from 'vitest';
import {
  type Box,
  drawingRoom,
  fittingScale,
  layPage,
  type Measure,
  PAPERS,
  type PageContent,
  type PictureRun,
} from '#client/features/desk/model/picture-page.ts';

/** About as wide as the type is: half its size for each character. */
const measure: Measure = (text, sizePt, bold) => text.length * sizePt * (bold ? 0.2 : 0.185);

const cell = (label: string, ...value: PictureRun[]) => ({ label, value });
const CONTENT: PageContent = {
  cells: [
    cell('Section', 'B–B at chainage 212'),
    cell('Dam', 'Harrow Fen Dam'),
    cell('Datum and units', 'Elevations in m LD, pressures in kPa'),
    cell('Scale', '1:500 on A4'),
    cell('Headwater', '118.00 m LD'),
    cell('Permeability', '2 × 10', { sup: '−7' }, ' m/s, ×/÷ 3'),
    cell('Net check', '2 cells not square, 1 crossing at 71°. And 2 more.'),
    cell('State', 'Draft, not checked'),
  ],
  legend: [
    'Equipotential',
    'Flow line',
    'Phreatic line',
    'Impervious boundary',
    'Reading point',
    'Known point',
    'Total head',
  ],
  caution:
    'A flow net is a two-dimensional, steady-state estimate. Local codes and licensed practice decide.',
};
const BAR = { units: 20, mmPerUnit: 2, label: '20 m', half: '10' };

function laid(paper: 'A4' | 'A3', width: number, height: number, bars = [BAR]) {
  const room = drawingRoom(paper, CONTENT, bars.length, measure);
  const frame = [0, 0, width, height] as const;
  const mmPerPx = fittingScale(frame, room);
  return { page: layPage(paper, frame, mmPerPx, CONTENT, bars, measure), room, mmPerPx };
}

const meet = (a: Box, b: Box) =>
  a.x < b.x + b.width - 1e-6 &&
  b.x < a.x + a.width - 1e-6 &&
  a.y < b.y + b.height - 1e-6 &&
  b.y < a.y + a.height - 1e-6;

describe('a page of a picture', () => {
  it.each([
    ['A4', 4000, 2000],
    ['A4', 900, 3000],
    ['A3', 8000, 1200],
    ['A3', 5200, 3600],
  ] as const)(
    'holds everything on %s, whatever the shape of the drawing (%d × %d px)',
    (paper, width, height) => {
      const { page } = laid(paper, width, height);
      const [paperWidth, paperHeight] = PAPERS[paper];
      expect(page.widthMm).toBe(paperWidth);
      expect(page.heightMm).toBeLessThanOrEqual(paperHeight + 0.5);
      const boxes = [
        page.drawing,
        ...page.bars,
        ...page.legend.map(({ sample }) => sample),
        ...page.cells.map(({ box }) => box),
      ];
      for (const box of boxes) {
        expect(box.x).toBeGreaterThanOrEqual(7.9);
        expect(box.x + box.width).toBeLessThanOrEqual(paperWidth - 7.9);
        expect(box.y + box.height).toBeLessThanOrEqual(page.heightMm);
      }
      boxes.forEach((a, i) => {
        boxes.slice(i + 1).forEach((b) => {
          expect(meet(a, b)).toBe(false);
        });
      });
    },
  );

  it('keeps the proportions of the drawing and fills its room one way', () => {
    const { page, room, mmPerPx } = laid('A4', 4000, 1000);
    expect(page.drawing.width / page.drawing.height).toBeCloseTo(4, 6);
    expect(page.drawing.width).toBeCloseTo(room[0], 6);
    expect(page.drawing.width).toBeCloseTo(4000 * mmPerPx, 6);
    // A flat section leaves the rest of the paper away.
    expect(page.heightMm).toBeLessThan(PAPERS.A4[1] - 50);
  });

  it('draws scale bars in the length they stand for, one above the other', () => {
    const { page } = laid('A4', 4000, 2000, [BAR, { ...BAR, units: 5, mmPerUnit: 8 }]);
    expect(page.bars.map((bar) => bar.width)).toEqual([40, 40]);
    expect(page.bars[1]!.y - page.bars[0]!.y).toBeGreaterThan(5);
  });

  it('keeps a power with its figure and every value within its cell', () => {
    const { page } = laid('A4', 4000, 2000);
    const permeability = page.cells.find(({ label }) => label.runs[0] === 'Permeability');
    expect(permeability?.value[0]?.runs.slice(0, 3)).toEqual(['2 ', '× ', '10']);
    expect(permeability?.value[0]?.runs[3]).toEqual({ sup: '−7' });
    for (const { box, value } of page.cells) {
      for (const line of value) {
        const width = line.runs.reduce(
          (sum, run) => sum + (typeof run === 'string' ? measure(run, 8, true) : measure(run.sup, 5.6, true)),
          0,
        );
        expect(line.x + width).toBeLessThanOrEqual(box.x + box.width + 1);
        expect(line.y).toBeLessThan(box.y + box.height);
      }
    }
  });

  it('leaves less room to the drawing the more the title block says', () => {
    const more = { ...CONTENT, cells: [...CONTENT.cells, ...CONTENT.cells, ...CONTENT.cells] };
    expect(drawingRoom('A4', more, 1, measure)[1]).toBeLessThan(
      drawingRoom('A4', CONTENT, 1, measure)[1] - 10,
    );
  });
});

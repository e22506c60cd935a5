import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { overlap } from '#shared/compute/geometry/taken-space.ts';
import { readNet } from '#shared/compute/read-net.ts';
import {
  type FigureLabel,
  type LabelSetting,
  placeFigureLabels,
} from '#shared/text/calculation-sheet/figure-labels.ts';
import { type SectionFigure, sectionFigure } from '#shared/text/calculation-sheet/section-figure.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

/** A figure as wide as that of a page, with letters of some size in points; a letter is about 0.6 of its size wide. */
function settingOf({ crop }: SectionFigure, letters = 7, widthPt = 530): LabelSetting {
  return { scale: widthPt / crop[2], letters, widthOf: (text) => text.length * 0.6 * letters };
}

const rectOf = ({ left, top, width, height }: FigureLabel) => ({
  left,
  top,
  right: left + width,
  bottom: top + height,
});

/** Pairs of labels of which one covers a part of the other. */
const covered = (labels: readonly FigureLabel[]) =>
  labels.flatMap((label, i) =>
    labels
      .slice(0, i)
      .filter((other) => overlap(rectOf(label), rectOf(other)))
      .map((other) => `${label.text} over ${other.text}`),
  );

function figureOf({ net, pxPerUnit }: (typeof EXACT_NETS)[number]): SectionFigure {
  const readings = [{ at: net.placeAt(3.4, 1.5), clicked: true }];
  const document = exactNetDocument(net, { pxPerUnit, readings });
  return sectionFigure(document, readNet(document))!;
}

/** Upright lines so many pixels apart, each with its head at the upper end, beside which there is paper. */
function fence(count: number, apart: number): SectionFigure {
  return {
    crop: [0, 0, 1000, 600],
    lines: Array.from({ length: count }, (_, i) => ({
      id: `l${i}`,
      kind: 'equipotential' as const,
      label: `10${i % 10}.${i % 10}0`,
      points: [
        [100 + i * apart, 100],
        [100 + i * apart, 500],
      ],
    })),
    profiles: [],
    points: [],
    knownPoints: [],
    scaleBars: [],
    flow: null,
  };
}

describe('labels of the figure of the section', () => {
  it.each(EXACT_NETS.map((each) => [each.name, each] as const))('of the %s cover nothing', (_name, each) => {
    const figure = figureOf(each);
    const labels = placeFigureLabels(figure, settingOf(figure));
    expect(covered(labels)).toEqual([]);
    const wanted = figure.lines.filter(({ label }) => label !== '').map(({ label }) => label);
    const heads = labels.filter(({ of }) => of !== 'point' && of !== 'knownPoint').map(({ text }) => text);
    expect(heads.toSorted()).toEqual(wanted.toSorted());
    const [, , width, height] = figure.crop.map((px) => px * settingOf(figure).scale);
    for (const { left, top, right, bottom } of labels.map(rectOf))
      expect([left >= 0, top >= 0, right <= width!, bottom <= height!]).toEqual([true, true, true, true]);
  });

  it('stand at the end of their line where there is room, and along it where there is none', () => {
    const roomy = placeFigureLabels(fence(4, 200), settingOf(fence(4, 200)));
    expect(roomy.every(({ top, height }) => top + height < 100 * 0.53)).toBe(true);
    const close = placeFigureLabels(fence(12, 20), settingOf(fence(12, 20)));
    expect(close).toHaveLength(12);
    expect(covered(close)).toEqual([]);
    expect(close.some(({ top }) => top > 110 * 0.53)).toBe(true);
  });

  it('never cover one another, at any distance and any size of letters; heads without room are left out', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 60 }),
        fc.double({ min: 2, max: 60, noNaN: true }),
        fc.double({ min: 3, max: 16, noNaN: true }),
        (count, apart, letters) => {
          const figure = fence(count, apart);
          expect(covered(placeFigureLabels(figure, settingOf(figure, letters)))).toEqual([]);
        },
      ),
    );
    const crowd = fence(60, 2);
    const shown = placeFigureLabels(crowd, settingOf(crowd)).length;
    expect(shown).toBeGreaterThan(4);
    expect(shown).toBeLessThan(60);
  });

  it('are nowhere nearer to a line of another head than to their own', () => {
    const figure = fence(12, 60);
    const { scale } = settingOf(figure);
    for (const { text, left, width } of placeFigureLabels(figure, settingOf(figure))) {
      const near = figure.lines.map(({ label, points }) => ({
        label,
        // The lines stand upright: how far the box is from each.
        away: Math.max(0, left - points[0]![0] * scale, points[0]![0] * scale - left - width),
      }));
      expect(near.toSorted((a, b) => a.away - b.away)[0]!.label).toBe(text);
    }
  });

  it('of boundaries may stand nearer to other lines, as a name is taken for no head', () => {
    const heads = fence(12, 40);
    const base = { id: 'base', kind: 'impervious' as const, label: 'Underside of the apron' };
    const line = {
      ...base,
      points: [
        [100, 100],
        [540, 100],
      ] as Array<[number, number]>,
    };
    const figure = { ...heads, lines: [...heads.lines, line] };
    const labels = placeFigureLabels(figure, settingOf(figure));
    expect(labels.filter(({ of }) => of === 'impervious')).toHaveLength(1);
    expect(labels).toHaveLength(13);
    expect(covered(labels)).toEqual([]);
  });

  it('of points are always there, and heads give way to them', () => {
    const figure = { ...fence(12, 40), points: [{ name: 'P1', at: [140, 92] as [number, number] }] };
    const labels = placeFigureLabels(figure, settingOf(figure));
    expect(labels.filter(({ text }) => text === 'P1')).toHaveLength(1);
    expect(covered(labels)).toEqual([]);
  });

  it('are not those of known points outside the figure', () => {
    const figure = { ...fence(1, 1), knownPoints: [{ name: 'K1', at: [-50, 20] as [number, number] }] };
    expect(placeFigureLabels(figure, settingOf(figure)).map(({ text }) => text)).toEqual(['100.00']);
  });
});

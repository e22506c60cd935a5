import { describe, expect, it } from 'vitest';
import { LABEL_HEIGHT_PX, labelWidthPx } from '#client/features/desk/render/label-layout.ts';
import { lookOf } from '#client/features/desk/render/line-look.ts';
import { LABEL_PREFIX, placeWords } from '#client/features/desk/render/place-words.ts';
import type { SceneItem, SceneLine, SceneMark } from '#client/features/desk/render/scene.ts';
import { boxOf } from '#shared/compute/geometry/place-apart.ts';
import { overlap } from '#shared/compute/geometry/taken-space.ts';
import type { SheetPoint } from '#shared/contract/document.ts';

function lineOf(id: string, points: SheetPoint[]): SceneLine {
  return { id, shape: 'line', points, look: lookOf('equipotential'), strong: false };
}

function labelOf(line: SceneLine, text = '112.00', strong = false): SceneMark {
  const at = line.points.at(-1)!;
  return {
    id: `${LABEL_PREFIX}${line.id}`,
    shape: 'label',
    at,
    text,
    colour: '',
    strong,
    offsetPx: [0, 0],
  };
}

/** Upright lines so many pixels apart, each with its label at the lower end. */
function fence(count: number, spacing: number, heightPx = 300): SceneItem[] {
  const lines = Array.from({ length: count }, (_, i) => {
    const x = 100 + spacing * i;
    return lineOf(String(i).padStart(3, '0'), [
      [x, 100],
      [x, 100 + heightPx],
    ]);
  });
  return [...lines, ...lines.map((line) => labelOf(line))];
}

function boxes(items: readonly SceneItem[], zoom = 1) {
  return items.flatMap((item) =>
    item.shape === 'label'
      ? [
          boxOf(
            { widthPx: labelWidthPx(item.text), heightPx: LABEL_HEIGHT_PX },
            { at: [item.at[0] * zoom, item.at[1] * zoom], offset: item.offsetPx },
          ),
        ]
      : [],
  );
}

function overlaps(items: readonly SceneItem[], zoom = 1): number {
  const all = boxes(items, zoom);
  return all.reduce((sum, box, i) => sum + all.slice(0, i).filter((other) => overlap(box, other)).length, 0);
}

const markOf = (items: readonly SceneItem[], id: string): SceneMark | undefined =>
  items.find((item): item is SceneMark => item.id === `${LABEL_PREFIX}${id}` && item.shape === 'label');

describe('heads at the lines', () => {
  it('stand below the ends of their lines where there is room', () => {
    const { items, crowded } = placeWords(fence(6, 70), 1);
    expect(crowded).toEqual([]);
    for (let i = 0; i < 6; i += 1)
      expect(markOf(items, String(i).padStart(3, '0'))?.offsetPx).toEqual([0, 16]);
  });

  it('go into a second row, and then on to their lines where that covers no other line', () => {
    const ends = Array.from({ length: 6 }, (_, i): SheetPoint => [300 + 4 * i, 400]);
    const lines = ends.map((end, i) => lineOf(String(i), [[60 + 110 * i, 100], end]));
    const { items, crowded } = placeWords([...lines, ...lines.map((line) => labelOf(line))], 1);
    expect(overlaps(items)).toBe(0);
    expect(crowded).toEqual([]);
    const onLine = lines.filter(({ id }) => markOf(items, id)?.offsetPx[1] === 0);
    expect(onLine.length).toBeGreaterThan(0);
    for (const { id, points } of onLine) {
      const [x, y] = markOf(items, id)!.at;
      const part = (y - points[0]![1]) / (points[1]![1] - points[0]![1]);
      expect(x).toBeCloseTo(points[0]![0] + part * (points[1]![0] - points[0]![0]), 6);
    }
  });

  it.each([5, 8, 12, 20])(
    'never overlap when lines stand %i px apart; those without room are left out',
    (spacing) => {
      const { items, crowded } = placeWords(fence(40, spacing), 1);
      expect(overlaps(items)).toBe(0);
      expect(boxes(items).length + crowded.length).toBe(40);
      expect(crowded.length).toBeGreaterThan(0);
      expect(boxes(items).length).toBeGreaterThan(6);
    },
  );

  it('of a chosen line are shown without room too', () => {
    const items = fence(40, 6).map((item) =>
      item.id === `${LABEL_PREFIX}020` ? ({ ...item, strong: true } as SceneMark) : item,
    );
    expect(markOf(placeWords(items, 1).items, '020')).toBeDefined();
  });

  it('are the same whatever order the lines were drawn in, and come back when the sheet is seen larger', () => {
    const items = fence(40, 8);
    const one = placeWords(items, 1);
    const other = placeWords([...items].reverse(), 1);
    for (const label of one.items) {
      if (label.shape !== 'label') continue;
      expect(markOf(other.items, label.id.slice(LABEL_PREFIX.length))).toEqual(label);
    }
    expect(placeWords(items, 8).crowded).toEqual([]);
    expect(overlaps(placeWords(items, 8).items, 8)).toBe(0);
  });

  it('stay where they were while something is dragged, and follow what is', () => {
    const before = placeWords(fence(40, 8), 1);
    const dragged = fence(40, 8).map((item) => {
      if (item.id !== `${LABEL_PREFIX}000` || item.shape !== 'label') return item;
      return { ...item, at: [90, 380] as SheetPoint };
    });
    const now = placeWords(dragged, 1, before.places);
    expect(now.crowded.map(({ id }) => id)).toEqual(before.crowded.map(({ id }) => id));
    expect(markOf(now.items, '001')).toEqual(markOf(before.items, '001'));
    expect(markOf(now.items, '000')).toMatchObject({
      at: [90, 380],
      offsetPx: markOf(before.items, '000')?.offsetPx,
    });
  });

  it('are placed for 200 crowded lines between two frames', () => {
    const items = fence(200, 6);
    placeWords(items, 1);
    // The processor's time: the clock's depends on what else the machine does.
    const began = process.cpuUsage();
    for (let i = 0; i < 20; i += 1) placeWords(items, 1);
    expect(process.cpuUsage(began).user / 1000 / 20).toBeLessThan(33);
  });
});

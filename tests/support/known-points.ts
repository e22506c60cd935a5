import type { EntityOf, FlowNetDocument, UnitSystem } from '#shared/contract/document.ts';
import { entityIdOf } from '#tests/support/exact-nets/exact-net-document.ts';

/** A known point as a test gives it. */
export type Known = Partial<EntityOf<'knownPoint'>> & { at: [number, number] };

/** A document that holds nothing but known points and a way of setting out. */
export function sectionOf(
  points: Known[],
  setOut: Partial<EntityOf<'setOut'>> = {},
  rest: { dpi?: number; unitSystem?: UnitSystem } = {},
): FlowNetDocument {
  const values = [
    ...points.map((point, i) => ({
      kind: 'knownPoint' as const,
      name: `K${i + 1}`,
      offset: null,
      elevation: null,
      use: 'fit' as const,
      ...point,
    })),
    {
      kind: 'setOut' as const,
      scales: 'equal' as const,
      method: 'points' as const,
      distance: null,
      level: 'line' as const,
      offsetsGrow: null,
      upstream: null,
      upQuarterTurns: null,
      statedScale: null,
      ...setOut,
    },
  ];
  return {
    format: 'tracehead/flow-net',
    version: 3,
    id: entityIdOf(999),
    name: '',
    unitSystem: rest.unitSystem ?? 'SI',
    datum: 'LD',
    sheet: { widthPx: 3000, heightPx: 2000, dpi: rest.dpi ?? null },
    entities: Object.fromEntries(
      values.map((value, i) => [entityIdOf(i + 1), { id: entityIdOf(i + 1), version: 1, value }]),
    ),
  };
}

/** A known point with all its values. */
export const known = (
  x: number,
  y: number,
  offset: number,
  elevation: number,
  use: 'fit' | 'check' = 'fit',
): Known => ({
  at: [x, y],
  offset,
  elevation,
  use,
});

/** Seepage per run of dam at a section's chainage, both in one length unit. */
export type SectionSeepage = { readonly chainage: number; readonly seepage: number };

/** Flow through the dam between two neighbouring sections. */
export type Reach = {
  readonly from: number;
  readonly to: number;
  readonly length: number;
  /** Length squared times length per second: m³/s or ft³/s. */
  readonly flow: number;
};

export type SeepageAlong = {
  readonly reaches: readonly Reach[];
  readonly length: number;
  readonly flow: number;
};

/**
 * Seepage over a length of dam by the average-end rule: Q = Σ ½(qᵢ + qᵢ₊₁)·(xᵢ₊₁ − xᵢ) between neighbouring chainages,
 * whatever order the sections are given in. Nothing is added beyond the first and the last section. `seepage` in m³/s
 * per m with chainages in metres, or ft³/s per ft with chainages in feet; the flow in m³/s or ft³/s. Null for fewer than
 * two different chainages, for two sections at one chainage (which of them holds is the engineer's to say), and where a
 * figure is not finite. Source: average-end rule as in earthwork (common practice with no source).
 */
export function seepageAlong(sections: readonly SectionSeepage[]): SeepageAlong | null {
  const ordered = [...sections].sort((a, b) => a.chainage - b.chainage);
  const reaches = ordered.slice(1).map((next, i): Reach => {
    const before = ordered[i]!;
    const length = next.chainage - before.chainage;
    const flow = 0.5 * (before.seepage + next.seepage) * length;
    return { from: before.chainage, to: next.chainage, length, flow };
  });
  if (reaches.length === 0) return null;
  if (!reaches.every(({ length, flow }) => length > 0 && Number.isFinite(flow))) return null;
  const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);
  return {
    reaches,
    length: sum(reaches.map(({ length }) => length)),
    flow: sum(reaches.map(({ flow }) => flow)),
  };
}

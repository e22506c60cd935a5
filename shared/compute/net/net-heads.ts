import { makeFinding } from '#shared/compute/findings.ts';
import { pointAlong } from '#shared/compute/geometry/polyline.ts';
import { countDrops, type DropCount } from '#shared/compute/net/count.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import { elevationAt, type Potential } from '#shared/compute/net/potentials.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { Finding, LineReading } from '#shared/contract/reading.ts';

/** Outlets within this part of the head lost lie at one level. */
const SAME_LEVEL_PART = 0.02;

/** Drops and head of one head line. `headAt` gives the head at a distance (pixels) along the given shape. */
export type HeadOfLine = {
  readonly id: string;
  readonly drops: number;
  readonly head: number | null;
  readonly source: LineReading['source'];
  readonly label: string;
};

export type NetHeads = {
  readonly byId: ReadonlyMap<string, HeadOfLine>;
  readonly count: DropCount | null;
  readonly headwater: number | null;
  readonly outHead: number | null;
  /** Elevations of the section, for faces along which the head is the elevation. */
  readonly map: SectionMap;
  readonly findings: readonly Finding[];
};

/**
 * Gives every head line of an ordered net its drops and head. `headwater` is the level typed, `stated` the count of
 * drops stated, both as in the document; `accuracy` is the tracing accuracy in the document's length unit, within
 * which outlets count as one level. Lines stay without drops while the count does not stand.
 */
export function headsOf(
  model: NetModel,
  map: SectionMap,
  headwater: number | null,
  stated: number | null,
  accuracy: number,
): NetHeads {
  const nothing = { byId: new Map(), count: null, headwater, outHead: null, map };
  const outlets = model.potentials.filter(
    (potential) => potential.role === 'outlet' && model.order.outlets.includes(potential.id),
  );
  if (headwater === null || outlets.length === 0) return { ...nothing, findings: [] };
  const outHead = Math.min(...outlets.map((outlet) => outlet.outHead));
  const apart = Math.max(...outlets.map((outlet) => outlet.outHead)) - outHead;
  if (apart > Math.max(SAME_LEVEL_PART * (headwater - outHead), 6 * accuracy)) {
    return { ...nothing, findings: [severalOutlets(outlets)] };
  }
  const byLine = new Map(model.equipotentials.map((line) => [line.id, line.line]));
  const sequence = model.order.sequence.map((id) => byLine.get(id)!);
  const count = countDrops(sequence, headwater, outHead, stated);
  const byId = new Map<string, HeadOfLine>();
  for (const line of count.lines) {
    const name = byLine.get(line.id)?.value.name.trim() ?? '';
    byId.set(line.id, { ...line, label: name === '' ? `line ${wholeOrShort(line.drops)}` : name });
  }
  const last = stated ?? 0;
  for (const potential of count.lines.length === sequence.length && count.findings.length === 0
    ? model.potentials
    : []) {
    byId.set(potential.id, {
      id: potential.id,
      drops: potential.role === 'headwater' ? 0 : last,
      head: potential.level,
      source: 'boundary',
      label: potential.label,
    });
  }
  return { byId, count, headwater, outHead, map, findings: count.findings };
}

/** Total head where a way arrives on a line: the line's own, or the elevation on a face of free outflow. */
export function headWhere(
  heads: NetHeads,
  line: HeadOfLine,
  shape: Parameters<typeof pointAlong>[0],
  s: number,
): number {
  return line.head ?? elevationAt(heads.map, ...pointAlong(shape, s));
}

function wholeOrShort(drops: number): string {
  return String(Math.round(drops * 100) / 100);
}

function severalOutlets(outlets: readonly Potential[]): Finding {
  return makeFinding(
    'missing',
    'severalOutlets',
    'The flow reaches outlets at different heads, so that there is no single count of drops. Read each outlet as a net of its own.',
    { cell: 'outlet', entityIds: outlets.map((outlet) => outlet.id) },
  );
}

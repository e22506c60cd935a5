import { makeFinding } from '#shared/compute/findings.ts';
import { pointAlong } from '#shared/compute/geometry/polyline.ts';
import { type CountedLine, countDrops, type DropCount } from '#shared/compute/net/count.ts';
import { countBranches } from '#shared/compute/net/count-branches.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import { elevationAt, type Potential } from '#shared/compute/net/potentials.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { Finding, LineReading } from '#shared/contract/reading.ts';

/** Outlets within this part of the head lost lie at one level. */
const SAME_LEVEL_PART = 0.02;
/** A boundary that the flow passes has a head between those of the lines beside it, to this part of a drop. */
const PASSED_PART = 0.1;

/** Drops and head of one head line; the head is null where it is the elevation and varies along the line. */
export type HeadOfLine = {
  readonly id: string;
  readonly drops: number;
  readonly head: number | null;
  readonly source: LineReading['source'];
  readonly label: string;
};

export type NetHeads = {
  readonly byId: ReadonlyMap<string, HeadOfLine>;
  /** The count on the way from the headwater to the lowest outlet. */
  readonly count: DropCount | null;
  readonly headwater: number | null;
  /** Head at the lowest outlet that the flow reaches. */
  readonly outHead: number | null;
  /** Outlets that the flow reaches, the lowest first. */
  readonly outlets: readonly Potential[];
  /** True when the outlets lie at different heads, so that no single count of drops holds. */
  readonly several: boolean;
  /** Elevations of the section, for faces along which the head is the elevation. */
  readonly map: SectionMap;
  readonly findings: readonly Finding[];
};

/**
 * Gives every head line of an ordered net its drops and head. `typedHeadwater` is the level typed, `stated` the count of
 * drops stated from the headwater to the lowest outlet, both as in the document; `accuracy` is the tracing accuracy in
 * the document's length unit, within which outlets count as one level. One head per drop holds for the whole net:
 * outlets at other heads lie at parts of a drop. Lines stay without drops while the count does not stand.
 */
export function headsOf(
  model: NetModel,
  map: SectionMap,
  typedHeadwater: number | null,
  stated: number | null,
  accuracy: number,
): NetHeads {
  const { potentials, order } = model;
  const headwater = potentials.find(({ role }) => role === 'headwater')?.level ?? typedHeadwater;
  const outlets = potentials
    .filter(({ id, role }) => role === 'outlet' && order.outlets.includes(id))
    .sort((a, b) => a.outHead - b.outHead);
  const outHead = outlets[0]?.outHead ?? null;
  const nothing = { byId: new Map(), count: null, headwater, outHead, outlets, several: false, map };
  const [main] = order.paths;
  if (headwater === null || outHead === null || main === undefined) return { ...nothing, findings: [] };
  const apart = outlets[outlets.length - 1]!.outHead - outHead;
  const several = apart > Math.max(SAME_LEVEL_PART * (headwater - outHead), 6 * accuracy);
  const byLine = new Map(model.equipotentials.map((line) => [line.id, line.line]));
  const count = countDrops(
    main.lines.map((id) => byLine.get(id)!),
    headwater,
    outHead,
    stated,
  );
  const stands = count.findings.length === 0;
  const all = stands ? countBranches(count, order.paths, byLine, potentials, headwater) : null;
  const byId = new Map(
    (all?.lines ?? count.lines).map((line) => [line.id, { ...line, label: labelOf(line, byLine) }]),
  );
  if (all === null || all.findings.length > 0) {
    return { ...nothing, byId, count, several, findings: [...count.findings, ...(all?.findings ?? [])] };
  }
  const found = boundaryHeads(potentials, {
    headwater,
    outHead,
    stated: stated ?? 0,
    headPerDrop: count.headPerDrop,
  });
  const heads = new Map<string, HeadOfLine>([...byId, ...found]);
  const findings = questionPassed(model, heads, PASSED_PART * (count.headPerDrop ?? 0));
  return { ...nothing, byId: heads, count, several, findings };
}

type Loss = { headwater: number; outHead: number; stated: number; headPerDrop: number | null };

function boundaryHeads(potentials: readonly Potential[], loss: Loss): Array<[string, HeadOfLine]> {
  return potentials.map(({ id, role, level, outHead, label }) => {
    const lost =
      role === 'headwater' || loss.headPerDrop === null ? 0 : (loss.headwater - outHead) / loss.headPerDrop;
    const drops = role === 'outlet' && outHead === loss.outHead ? loss.stated : lost;
    return [id, { id, drops, head: level, source: 'boundary', label }];
  });
}

function labelOf({ id, drops }: CountedLine, lines: ReadonlyMap<string, NetLine>): string {
  const name = lines.get(id)?.value.name.trim() ?? '';
  return name === '' ? `line ${wholeOrShort(drops)}` : name;
}

/** Questions a boundary whose head does not lie between those of the two lines between which the flow passes it. */
function questionPassed(model: NetModel, heads: ReadonlyMap<string, HeadOfLine>, slack: number): Finding[] {
  return model.order.passed.flatMap(({ boundary, after }) => {
    const potential = model.potentials.find(({ id }) => id === boundary)!;
    const pair = model.order.pairs.find(({ before }) =>
      after === null ? heads.get(before)?.drops === 0 : before === after,
    );
    const [first, last] = [pair?.before, pair?.after].map((id) => heads.get(id ?? '')?.head ?? null);
    if (first == null || last == null) return [];
    const between =
      potential.outHead <= Math.max(first, last) + slack &&
      potential.outHead >= Math.min(first, last) - slack;
    return between ? [] : [doesNotPass(potential, heads.get(pair!.before)!, heads.get(pair!.after)!)];
  });
}

function doesNotPass({ label, members, line }: Potential, before: HeadOfLine, after: HeadOfLine): Finding {
  return makeFinding(
    'wrong',
    'outletOutOfOrder',
    `The flow passes ${label} between ${before.label} and ${after.label}, but its head does not lie between theirs. Trace the missing lines, or correct the level or the count.`,
    { cell: 'outlet', entityIds: members, at: line.value.points[0] ?? null },
  );
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

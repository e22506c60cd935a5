import { makeFinding } from '#shared/compute/findings.ts';
import { type CountedLine, countBetween, type DropCount } from '#shared/compute/net/count.ts';
import type { FlowPath } from '#shared/compute/net/flow-paths.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { Potential } from '#shared/compute/net/potentials.ts';
import type { Finding } from '#shared/contract/reading.ts';

/**
 * Counts the lines of the further ways of the water, once those of the first one are counted: a way that leads to
 * another outlet, or comes from another boundary, goes by the same head per drop, so that its ends lie at
 * (H − level)/Δh drops, parts of a drop included. `counted`: the count of the first way; `headwater`: H. Returns the
 * lines of all ways, or the findings that say where lines and levels disagree.
 */
export function countBranches(
  counted: DropCount,
  paths: readonly FlowPath[],
  lines: ReadonlyMap<string, NetLine>,
  potentials: readonly Potential[],
  headwater: number,
): { lines: readonly CountedLine[]; findings: readonly Finding[] } {
  const known = new Map(counted.lines.map((line) => [line.id, line]));
  const findings: Finding[] = [];
  for (const path of paths.slice(1)) {
    const [source, outlet] = [path.source, path.outlet].map(
      (id) => potentials.find((each) => each.id === id)!,
    );
    const way = path.lines.map((id) => lines.get(id)!);
    const found =
      counted.unequal || counted.headPerDrop === null
        ? byTypedHeads(way, known, counted.headPerDrop)
        : countBetween(way, known, {
            headwater,
            headPerDrop: counted.headPerDrop,
            from: source!.role === 'headwater' ? 0 : (headwater - source!.outHead) / counted.headPerDrop,
            to: (headwater - outlet!.outHead) / counted.headPerDrop,
            fromLabel: source!.role === 'headwater' ? 'the headwater' : source!.label,
            toLabel: outlet!.label,
          });
    findings.push(...found.findings);
    for (const line of found.lines) known.set(line.id, line);
  }
  return { lines: [...known.values()], findings };
}

/** Without one head per drop a line beyond a fork has only the head that was typed for it. */
function byTypedHeads(
  way: readonly NetLine[],
  known: ReadonlyMap<string, CountedLine>,
  headPerDrop: number | null,
): { lines: CountedLine[]; findings: Finding[] } {
  const lines: CountedLine[] = [];
  let drops = 0;
  for (const line of way) {
    const before = known.get(line.id);
    drops = before?.drops ?? drops + 1;
    if (before !== undefined) continue;
    if (line.value.head === null || headPerDrop === null) return { lines: [], findings: [headWanted(line)] };
    lines.push({ id: line.id, drops, head: line.value.head, source: 'typedHead' });
  }
  return { lines, findings: [] };
}

function headWanted(line: NetLine): Finding {
  return makeFinding(
    'missing',
    'headWanted',
    'The lines part the head unequally and the flow forks: type the head of each line beyond the fork.',
    { cell: 'drops', entityIds: [line.id], at: line.value.points[0] ?? null },
  );
}

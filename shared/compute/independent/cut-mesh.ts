import type { BoundarySide, QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';

/** Label of the sides of a cut; no condition has it. */
export const CUT = -2;

/**
 * A mesh slit open along a way of element sides. `original`: the node of the uncut mesh for each node; `pairs`: the two
 * nodes of each place of the cut, that on the right and that on the left of the way.
 */
export type CutMesh = {
  readonly mesh: QuadraticMesh;
  readonly original: Int32Array;
  readonly pairs: ReadonlyArray<readonly [right: number, left: number]>;
};

/**
 * Slits a mesh from a node of one set to one of another by the fewest element sides, past no other node on its edge.
 * Null when there is no such way.
 */
export function cutMesh(
  mesh: QuadraticMesh,
  from: ReadonlySet<number>,
  to: ReadonlySet<number>,
): CutMesh | null {
  const way = shortestWay(mesh, from, to);
  return way === null ? null : slitAlong(mesh, way);
}

/** The slots (6·element + 3 + side) of each middle node. */
function slotsOfMiddles({ elements }: QuadraticMesh): Map<number, number[]> {
  const slots = new Map<number, number[]>();
  elements.forEach((node, slot) => {
    if (slot % 6 < 3) return;
    const known = slots.get(node);
    if (known === undefined) slots.set(node, [slot]);
    else known.push(slot);
  });
  return slots;
}

/** Slots of the two ends of the side whose middle stands in a slot. */
function endSlots(slot: number): [number, number] {
  const first = slot - (slot % 6);
  const k = (slot % 6) - 3;
  return [first + k, first + ((k + 1) % 3)];
}

function shortestWay(
  mesh: QuadraticMesh,
  from: ReadonlySet<number>,
  to: ReadonlySet<number>,
): Array<{ middle: number; end: number }> | null {
  const neighbours = new Map<number, Array<{ middle: number; end: number }>>();
  for (const [middle, slots] of slotsOfMiddles(mesh)) {
    if (slots.length < 2) continue;
    const [a, b] = endSlots(slots[0]!).map((slot) => mesh.elements[slot]!) as [number, number];
    neighbours.set(a, [...(neighbours.get(a) ?? []), { middle, end: b }]);
    neighbours.set(b, [...(neighbours.get(b) ?? []), { middle, end: a }]);
  }
  const onEdge = new Set(mesh.sides.flatMap(({ nodes }) => [nodes[0], nodes[2]]));
  const cameBy = new Map<number, { before: number; middle: number } | null>(
    [...from].map((node) => [node, null]),
  );
  let wave = [...from];
  while (wave.length > 0) {
    const next: number[] = [];
    for (const node of wave) {
      for (const { middle, end } of neighbours.get(node) ?? []) {
        if (cameBy.has(end)) continue;
        cameBy.set(end, { before: node, middle });
        if (to.has(end)) return wayBack(cameBy, end);
        if (!onEdge.has(end)) next.push(end);
      }
    }
    wave = next;
  }
  return null;
}

function wayBack(
  cameBy: ReadonlyMap<number, { before: number; middle: number } | null>,
  last: number,
): Array<{ middle: number; end: number }> {
  const way: Array<{ middle: number; end: number }> = [];
  for (let end = last, step = cameBy.get(end); step; end = step.before, step = cameBy.get(end))
    way.unshift({ middle: step.middle, end });
  return way;
}

function slitAlong(mesh: QuadraticMesh, way: ReadonlyArray<{ middle: number; end: number }>): CutMesh {
  const { elements } = mesh;
  const middles = slotsOfMiddles(mesh);
  const slit = new Map(way.map(({ middle, end }) => [middle, end]));
  const sameCorner = new SlotSets(elements.length);
  for (const [middle, slots] of middles) {
    if (slots.length < 2 || slit.has(middle)) continue;
    const [one, other] = slots.map(endSlots);
    for (const a of one!) for (const b of other!) if (elements[a] === elements[b]) sameCorner.join(a, b);
    sameCorner.join(slots[0]!, slots[1]!);
  }
  const numbers = new Map<number, number>();
  const original: number[] = [];
  const renumbered = elements.map((node, slot) => {
    const root = sameCorner.rootOf(slot);
    const known = numbers.get(root);
    if (known !== undefined) return known;
    numbers.set(root, original.length);
    return original.push(node) - 1;
  });
  const sides: BoundarySide[] = mesh.sides.map((side) => ({
    ...side,
    nodes: sideNodes(elements, renumbered, side),
  }));
  const pairs = new Map<string, readonly [number, number]>();
  for (const [middle, end] of slit) {
    const [left, right] = middles
      .get(middle)!
      .toSorted((a, b) => Number(endsAt(elements, b, end)) - Number(endsAt(elements, a, end)));
    const [leftEnds, rightEnds] = [endSlots(left!), endSlots(right!)];
    const along = [
      [rightEnds[1], leftEnds[0]],
      [right!, left!],
      [rightEnds[0], leftEnds[1]],
    ] as const;
    for (const [r, l] of along) {
      const pair = [renumbered[r]!, renumbered[l]!] as const;
      pairs.set(pair.join(), pair);
    }
    for (const [slot, ends] of [
      [left!, leftEnds],
      [right!, rightEnds],
    ] as const)
      sides.push({
        element: Math.floor(slot / 6),
        nodes: [renumbered[ends[0]]!, renumbered[slot]!, renumbered[ends[1]]!],
        label: CUT,
      });
  }
  const { x, y } = mesh;
  const cut: QuadraticMesh = {
    ...mesh,
    x: Float64Array.from(original, (node) => x[node]!),
    y: Float64Array.from(original, (node) => y[node]!),
    elements: renumbered,
    sides,
  };
  return { mesh: cut, original: Int32Array.from(original), pairs: [...pairs.values()] };
}

/** True when the side whose middle stands in a slot runs, in its element's direction, to a node. */
function endsAt(elements: Int32Array, slot: number, end: number): boolean {
  return elements[endSlots(slot)[1]] === end;
}

function sideNodes(
  elements: Int32Array,
  renumbered: Int32Array,
  { element, nodes }: BoundarySide,
): [number, number, number] {
  const slot = [3, 4, 5].map((k) => 6 * element + k).find((each) => elements[each] === nodes[1])!;
  const [from, to] = endSlots(slot);
  return [renumbered[from]!, renumbered[slot]!, renumbered[to]!];
}

/** Slots that hold one node, drawn together by twos. */
class SlotSets {
  private readonly parent: Int32Array;

  constructor(size: number) {
    this.parent = Int32Array.from({ length: size }, (_, i) => i);
  }

  rootOf(slot: number): number {
    let root = slot;
    while (this.parent[root] !== root) {
      this.parent[root] = this.parent[this.parent[root]!]!;
      root = this.parent[root]!;
    }
    return root;
  }

  join(a: number, b: number): void {
    this.parent[this.rootOf(a)] = this.rootOf(b);
  }
}

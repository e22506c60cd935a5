import type { Tensor } from '#shared/compute/independent/conductivity.ts';
import { shapeOf, stiffness } from '#shared/compute/independent/quadratic-element.ts';
import type { QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';
import type { SparseRows } from '#shared/compute/solve/conjugate-gradient.ts';
import { nestedDissection } from '#shared/compute/solve/nested-dissection.ts';
import { choleskyOf } from '#shared/compute/solve/sparse-cholesky.ts';

/**
 * How the values at the nodes follow from the unknowns: base + the unknown's value; `unknown` −1 where the value is
 * held. Nodes that share an unknown differ by a given amount.
 */
export type Unknowns = {
  readonly base: Float64Array;
  readonly unknown: Int32Array;
  readonly count: number;
};

/** Values at the nodes, and K·values: what flows in at each node (0 where nothing is held). */
export type FieldSolution = { readonly values: Float64Array; readonly inflow: Float64Array };

/** Each unknown of its own but for nodes that are held: `held` gives the value or NaN. */
export function unknownsOf(held: Float64Array): Unknowns {
  let count = 0;
  const unknown = Int32Array.from(held, (value) => (Number.isNaN(value) ? count++ : -1));
  return { base: held.map((value) => (Number.isNaN(value) ? 0 : value)), unknown, count };
}

/** Stiffness of all elements, 36 numbers each. */
export function elementStiffness(mesh: QuadraticMesh, tensorOf: (n: number) => Tensor): Float64Array {
  const count = mesh.elements.length / 6;
  const all = new Float64Array(36 * count);
  for (let n = 0; n < count; n += 1)
    stiffness(shapeOf(mesh, n), tensorOf(n), all.subarray(36 * n, 36 * n + 36));
  return all;
}

/**
 * Solves ∇·(K∇v) = 0 with held values and no flow elsewhere, but for what `load` brings in at the nodes: null when the
 * matrix is not positive definite, that is when a part of the mesh has no held value. K by `elements`, from
 * `elementStiffness`; `order` from `eliminationOrder`.
 */
export function solveField(
  mesh: QuadraticMesh,
  elements: Float64Array,
  unknowns: Unknowns,
  order: Int32Array,
  load: Float64Array | null = null,
): FieldSolution | null {
  const values = unknowns.base.slice();
  if (unknowns.count > 0) {
    const { matrix, right } = assemble(mesh, elements, unknowns, load);
    const factor = choleskyOf(matrix, orderOfUnknowns(order, unknowns));
    if (factor === null) return null;
    const solved = factor.solve(right);
    unknowns.unknown.forEach((u, node) => {
      if (u >= 0) values[node] = values[node]! + solved[u]!;
    });
  }
  return { values, inflow: productWith(mesh, elements, values) };
}

/**
 * An order of elimination for all nodes of a mesh, by nested dissection; it serves every system on the mesh, the nodes
 * of which that are held being passed over.
 */
export function eliminationOrder(mesh: QuadraticMesh): Int32Array {
  const count = mesh.x.length;
  const { starts, columns } = neighboursOf(
    mesh,
    Int32Array.from({ length: count }, (_, i) => i),
    count,
  );
  return nestedDissection({ n: count, starts, columns }, mesh.x, mesh.y);
}

/** The unknowns in the order in which their nodes come; one shared by several nodes takes the place of the last. */
function orderOfUnknowns(order: Int32Array, { unknown, count }: Unknowns): Int32Array {
  const result = new Int32Array(count);
  const isPlaced = new Uint8Array(count);
  let end = count;
  for (let i = order.length - 1; i >= 0; i -= 1) {
    const u = unknown[order[i]!]!;
    if (u < 0 || isPlaced[u] === 1) continue;
    isPlaced[u] = 1;
    end -= 1;
    result[end] = u;
  }
  return result;
}

/** The other unknowns that share an element with each unknown, by rows. */
function neighboursOf(
  { elements }: QuadraticMesh,
  unknown: Int32Array,
  count: number,
): { starts: Int32Array; columns: Int32Array } {
  const byRow = elementsByUnknown(elements, unknown, count);
  const starts = new Int32Array(count + 1);
  const columns = new Int32Array(5 * byRow.slots.length);
  const seen = new Int32Array(count).fill(-1);
  let end = 0;
  for (let u = 0; u < count; u += 1) {
    seen[u] = u;
    for (let k = byRow.starts[u]!; k < byRow.starts[u + 1]!; k += 1) {
      const first = byRow.slots[k]! - (byRow.slots[k]! % 6);
      for (let j = first; j < first + 6; j += 1) {
        const v = unknown[elements[j]!]!;
        if (v < 0 || seen[v] === u) continue;
        seen[v] = u;
        columns[end] = v;
        end += 1;
      }
    }
    starts[u + 1] = end;
  }
  return { starts, columns: columns.slice(0, end) };
}

/** K·v at every node. */
export function productWith(mesh: QuadraticMesh, elements: Float64Array, values: Float64Array): Float64Array {
  const result = new Float64Array(values.length);
  const numbers = mesh.elements;
  for (let n = 0; 6 * n < numbers.length; n += 1) {
    for (let i = 0; i < 6; i += 1) {
      let sum = 0;
      for (let j = 0; j < 6; j += 1) sum += elements[36 * n + 6 * i + j]! * values[numbers[6 * n + j]!]!;
      const node = numbers[6 * n + i]!;
      result[node] = result[node]! + sum;
    }
  }
  return result;
}

/** The matrix of the unknowns and the right side that the held values leave. */
export function assemble(
  mesh: QuadraticMesh,
  elements: Float64Array,
  { base, unknown, count }: Unknowns,
  load: Float64Array | null = null,
): { matrix: SparseRows; right: Float64Array } {
  const numbers = mesh.elements;
  const held = productWith(mesh, elements, base);
  const right = new Float64Array(count);
  unknown.forEach((u, node) => {
    if (u >= 0) right[u] = right[u]! - held[node]! + (load?.[node] ?? 0);
  });
  const { starts, columns } = neighboursOf(mesh, unknown, count);
  const values = new Float64Array(columns.length);
  const diagonal = new Float64Array(count);
  const byRow = elementsByUnknown(numbers, unknown, count);
  const place = new Int32Array(count);
  for (let u = 0; u < count; u += 1) {
    for (let e = starts[u]!; e < starts[u + 1]!; e += 1) place[columns[e]!] = e;
    for (let k = byRow.starts[u]!; k < byRow.starts[u + 1]!; k += 1) {
      const slot = byRow.slots[k]!;
      const first = slot - (slot % 6);
      for (let j = 0; j < 6; j += 1) {
        const v = unknown[numbers[first + j]!]!;
        if (v < 0) continue;
        const value = elements[6 * slot + j]!;
        if (v === u) diagonal[u] = diagonal[u]! + value;
        else values[place[v]!] = values[place[v]!]! + value;
      }
    }
  }
  const matrix = { n: count, starts, columns, values, diagonal };
  return { matrix, right };
}

/** For each unknown the slots (6·element + corner) at which it stands. */
function elementsByUnknown(
  numbers: Int32Array,
  unknown: Int32Array,
  count: number,
): { starts: Int32Array; slots: Int32Array } {
  const starts = new Int32Array(count + 1);
  for (const node of numbers) if (unknown[node]! >= 0) starts[unknown[node]! + 1]! += 1;
  for (let u = 0; u < count; u += 1) starts[u + 1]! += starts[u]!;
  const end = starts.slice();
  const slots = new Int32Array(starts[count]!);
  numbers.forEach((node, slot) => {
    const u = unknown[node]!;
    if (u < 0) return;
    slots[end[u]!] = slot;
    end[u]! += 1;
  });
  return { starts, slots };
}

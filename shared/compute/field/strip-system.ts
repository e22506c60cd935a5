import type { StripMesh } from '#shared/compute/field/strip-mesh.ts';
import type { SparseRows } from '#shared/compute/solve/conjugate-gradient.ts';

/** A symmetric permeability tensor in the frame of the mesh; only ratios count. */
export type MeshTensor = { readonly xx: number; readonly xy: number; readonly yy: number };

/** Equations for the heads that are not held; `rowOf`: the row of each unknown, −1 where it is held or cut off. */
export type StripSystem = {
  readonly rows: SparseRows;
  readonly right: Float64Array;
  readonly rowOf: Int32Array;
};

/** A triangle below this area, squared pixels, has none. */
const LEAST_AREA = 5e-10;

/**
 * Stiffness of every linear triangle, six numbers each: 00, 01, 02, 11, 12, 22; all NaN for one without area.
 * kᵢⱼ = (bᵢ, cᵢ)·K·(bⱼ, cⱼ)/4A with b, c the opposite sides turned by a right angle. `tensorAt` gives K at the middle
 * of a triangle; null for the same in all directions everywhere. Source: Zienkiewicz, Mayer and Cheung (1966).
 */
export function stiffnessOf(
  mesh: StripMesh,
  tensorAt: ((x: number, y: number) => MeshTensor) | null,
): Float64Array {
  const { xy, triangles } = mesh;
  const stiffness = new Float64Array(2 * triangles.length);
  for (let t = 0; t < triangles.length; t += 3) {
    const i = 2 * triangles[t]!;
    const j = 2 * triangles[t + 1]!;
    const k = 2 * triangles[t + 2]!;
    const b0 = xy[j + 1]! - xy[k + 1]!;
    const b1 = xy[k + 1]! - xy[i + 1]!;
    const b2 = xy[i + 1]! - xy[j + 1]!;
    const c0 = xy[k]! - xy[j]!;
    const c1 = xy[i]! - xy[k]!;
    const c2 = xy[j]! - xy[i]!;
    const area = Math.abs(b0 * c1 - b1 * c0) / 2;
    const tensor =
      tensorAt === null
        ? ISOTROPIC
        : tensorAt((xy[i]! + xy[j]! + xy[k]!) / 3, (xy[i + 1]! + xy[j + 1]! + xy[k + 1]!) / 3);
    const part = area > LEAST_AREA ? 1 / (4 * area) : Number.NaN;
    const xx = tensor.xx * part;
    const xz = tensor.xy * part;
    const yy = tensor.yy * part;
    const at = 2 * t;
    stiffness[at] = b0 * b0 * xx + 2 * b0 * c0 * xz + c0 * c0 * yy;
    stiffness[at + 1] = b0 * b1 * xx + (b0 * c1 + b1 * c0) * xz + c0 * c1 * yy;
    stiffness[at + 2] = b0 * b2 * xx + (b0 * c2 + b2 * c0) * xz + c0 * c2 * yy;
    stiffness[at + 3] = b1 * b1 * xx + 2 * b1 * c1 * xz + c1 * c1 * yy;
    stiffness[at + 4] = b1 * b2 * xx + (b1 * c2 + b2 * c1) * xz + c1 * c2 * yy;
    stiffness[at + 5] = b2 * b2 * xx + 2 * b2 * c2 * xz + c2 * c2 * yy;
  }
  return stiffness;
}

const ISOTROPIC: MeshTensor = { xx: 1, xy: 0, yy: 1 };

/** Where the stiffness between corners i and j of a triangle stands. */
const PLACE = [0, 1, 2, 1, 3, 4, 2, 4, 5];

/**
 * The equations of a mesh whose heads `held` are given, NaN where they are not. Unknowns that no triangle with an area
 * joins to a held one are left out: they have no head.
 */
export function systemOf(mesh: StripMesh, stiffness: Float64Array, held: Float64Array): StripSystem {
  const sheaves = trianglesAt(mesh, stiffness);
  const { rowOf, n } = rowsOf(mesh, sheaves, held);
  const { starts, columns } = patternOf(mesh, sheaves, rowOf, n);
  const values = new Float64Array(columns.length);
  const diagonal = new Float64Array(n);
  const right = new Float64Array(n);
  const { unknowns } = mesh;
  for (let t = 0; t < unknowns.length; t += 3) {
    if (Number.isNaN(stiffness[2 * t]!)) continue;
    for (let i = 0; i < 3; i += 1) {
      const row = rowOf[unknowns[t + i]!]!;
      if (row < 0) continue;
      for (let j = 0; j < 3; j += 1) {
        const value = stiffness[2 * t + PLACE[3 * i + j]!]!;
        const other = unknowns[t + j]!;
        const column = rowOf[other]!;
        if (column === row) diagonal[row] = diagonal[row]! + value;
        else if (column >= 0) {
          let at = starts[row]!;
          while (columns[at] !== column) at += 1;
          values[at] = values[at]! + value;
        } else if (!Number.isNaN(held[other]!)) right[row] = right[row]! - value * held[other]!;
      }
    }
  }
  return { rows: { n, starts, columns, values, diagonal }, right, rowOf };
}

/** Numbers the unknowns that triangles with an area join to a held one, from the held ones inwards. */
function rowsOf(
  { unknowns, unknownCount }: StripMesh,
  sheaves: Sheaves,
  held: Float64Array,
): { rowOf: Int32Array; n: number } {
  const rowOf = new Int32Array(unknownCount).fill(-1);
  const seen = new Uint8Array(unknownCount);
  const queue = new Int32Array(unknownCount);
  let queued = 0;
  for (let u = 0; u < unknownCount; u += 1) {
    if (Number.isNaN(held[u]!)) continue;
    seen[u] = 1;
    queue[queued] = u;
    queued += 1;
  }
  let row = 0;
  for (let q = 0; q < queued; q += 1) {
    const u = queue[q]!;
    for (let k = sheaves.starts[u]!; k < sheaves.starts[u + 1]!; k += 1) {
      const t = sheaves.items[k]!;
      for (let i = 0; i < 3; i += 1) {
        const other = unknowns[t + i]!;
        if (seen[other] === 1) continue;
        seen[other] = 1;
        rowOf[other] = row;
        row += 1;
        queue[queued] = other;
        queued += 1;
      }
    }
  }
  return { rowOf, n: row };
}

/** For each unknown the triangles with an area at it (first corner's number), packed. */
type Sheaves = { readonly starts: Int32Array; readonly items: Int32Array };

function trianglesAt({ unknowns, unknownCount: count }: StripMesh, stiffness: Float64Array): Sheaves {
  const starts = new Int32Array(count + 1);
  for (let t = 0; t < unknowns.length; t += 3) {
    if (Number.isNaN(stiffness[2 * t]!)) continue;
    for (let i = 0; i < 3; i += 1) starts[unknowns[t + i]! + 1] = starts[unknowns[t + i]! + 1]! + 1;
  }
  for (let u = 0; u < count; u += 1) starts[u + 1] = starts[u + 1]! + starts[u]!;
  const next = starts.slice(0, count);
  const items = new Int32Array(starts[count]!);
  for (let t = 0; t < unknowns.length; t += 3) {
    if (Number.isNaN(stiffness[2 * t]!)) continue;
    for (let i = 0; i < 3; i += 1) {
      const u = unknowns[t + i]!;
      items[next[u]!] = t;
      next[u] = next[u]! + 1;
    }
  }
  return { starts, items };
}

/** Which columns each row has, the diagonal apart. */
function patternOf(
  { unknowns }: StripMesh,
  sheaves: Sheaves,
  rowOf: Int32Array,
  n: number,
): { starts: Int32Array; columns: Int32Array } {
  const unknownOf = new Int32Array(n);
  rowOf.forEach((row, u) => {
    if (row >= 0) unknownOf[row] = u;
  });
  const starts = new Int32Array(n + 1);
  const columns: number[] = [];
  const lastRow = new Int32Array(n).fill(-1);
  for (let row = 0; row < n; row += 1) {
    const u = unknownOf[row]!;
    for (let k = sheaves.starts[u]!; k < sheaves.starts[u + 1]!; k += 1) {
      const t = sheaves.items[k]!;
      for (let i = 0; i < 3; i += 1) {
        const column = rowOf[unknowns[t + i]!]!;
        if (column < 0 || column === row || lastRow[column] === row) continue;
        lastRow[column] = row;
        columns.push(column);
      }
    }
    starts[row + 1] = columns.length;
  }
  return { starts, columns: Int32Array.from(columns) };
}

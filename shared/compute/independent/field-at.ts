import Flatbush from 'flatbush';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import {
  areaCoordinates,
  gradientIn,
  shapeOf,
  shapeValues,
} from '#shared/compute/independent/quadratic-element.ts';
import type { QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';

/** Finds the element that holds a place of the frame, and reads fields there. */
export class FieldReader {
  private readonly index: Flatbush;
  private readonly tolerance: number;

  constructor(private readonly mesh: QuadraticMesh) {
    const { x, y, elements } = mesh;
    this.index = new Flatbush(mesh.regions.length);
    for (let n = 0; n < mesh.regions.length; n += 1) {
      const [a, b, c] = [elements[6 * n]!, elements[6 * n + 1]!, elements[6 * n + 2]!];
      this.index.add(
        Math.min(x[a]!, x[b]!, x[c]!),
        Math.min(y[a]!, y[b]!, y[c]!),
        Math.max(x[a]!, x[b]!, x[c]!),
        Math.max(y[a]!, y[b]!, y[c]!),
      );
    }
    this.index.finish();
    this.tolerance = 1e-9 * Math.hypot(this.index.maxX - this.index.minX, this.index.maxY - this.index.minY);
  }

  /** Element and area coordinates of a place; null outside the mesh. On a wall the place counts to either side. */
  locate([px, py]: Pair): { element: number; at: [number, number, number] } | null {
    const near = this.index.search(
      px - this.tolerance,
      py - this.tolerance,
      px + this.tolerance,
      py + this.tolerance,
    );
    let best: { element: number; at: [number, number, number] } | null = null;
    let deepest = Number.NEGATIVE_INFINITY;
    for (const element of near) {
      const at = areaCoordinates(this.mesh, element, px, py);
      // As a distance: an area coordinate times the height above its side.
      const size = Math.sqrt(2 * shapeOf(this.mesh, element).area);
      const depth = Math.min(...at) * size;
      if (depth < -this.tolerance || depth <= deepest) continue;
      deepest = depth;
      best = { element, at };
    }
    return best;
  }

  /** Value of a field at a place; null outside the mesh. */
  valueAt(values: Float64Array, place: Pair): number | null {
    const found = this.locate(place);
    if (found === null) return null;
    const weights = shapeValues(found.at);
    return weights.reduce(
      (sum, weight, k) => sum + weight * values[this.mesh.elements[6 * found.element + k]!]!,
      0,
    );
  }

  /** Gradient of a field in the frame at a place; null outside the mesh. */
  gradientAt(values: Float64Array, place: Pair): Pair | null {
    const found = this.locate(place);
    if (found === null) return null;
    return gradientIn(this.mesh, found.element, shapeOf(this.mesh, found.element), values, found.at);
  }
}

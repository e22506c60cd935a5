/**
 * Length of a vector, in the unit of its parts: √(dx² + dy²). For inner loops: `Math.hypot` guards against overflow,
 * which coordinates on a sheet or in a section are far from, and makes a number on the heap at each call.
 */
export function lengthOfVector(dx: number, dy: number): number {
  return Math.sqrt(dx * dx + dy * dy);
}

/** Figures that differ in the last bits only, as after the same run on another machine, are the same. */
export function isSameFigure(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), Math.abs(b));
}

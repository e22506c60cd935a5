/** What the provisional ± of a reading is made of; lengths in the document's unit. */
export type DoubtInputs = {
  /** Head between the two neighbouring lines. */
  readonly intervalHead: number;
  /** Distance between the two neighbouring lines through the point, in the document's length unit. */
  readonly intervalLength: number;
  /** Uncertainty of a place set out on this section (95 %). */
  readonly placeDoubt: number;
  /** True when the point was clicked on the drawing, so that its elevation carries the calibration's error. */
  readonly clicked: boolean;
};

/** Part of an interval by which a fraction guessed between two lines may be wrong. */
const INTERVAL_PART = 0.25;

/**
 * Provisional ± of a total head and of the pressure head, document length unit: a quarter of the drop between the
 * neighbouring lines, and the calibration. A clicked point shares the lines' calibration error, so that only its
 * elevation is in doubt; a typed point lies in doubt among the lines, at the gradient there. Own rule, to be replaced
 * by first-order propagation.
 */
export function provisionalDoubt(inputs: DoubtInputs): { head: number; pressureHead: number } {
  const quarter = INTERVAL_PART * Math.abs(inputs.intervalHead);
  if (inputs.clicked) return { head: quarter, pressureHead: Math.hypot(quarter, inputs.placeDoubt) };
  const gradient = inputs.intervalLength > 0 ? Math.abs(inputs.intervalHead) / inputs.intervalLength : 0;
  const head = Math.hypot(quarter, Math.min(gradient * inputs.placeDoubt, Math.abs(inputs.intervalHead)));
  return { head, pressureHead: head };
}

/**
 * Uncertainty of a place on the section at about 95 %, document length unit: twice the residual where there is one,
 * never less than the stated accuracy of the known points and of tracing allow.
 */
export function placeDoubtOf(
  residual: number | null,
  knownPointAccuracyPx: number,
  tracingAccuracyPx: number,
  unitsPerPx: number,
): number {
  const calibration = Math.max(2 * (residual ?? 0), knownPointAccuracyPx * unitsPerPx);
  return Math.hypot(calibration, tracingAccuracyPx * unitsPerPx);
}

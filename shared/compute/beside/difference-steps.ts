/** Parts of the head lost at which the tint changes: a tenth, a quarter and half of a drop where there are ten. */
export const STEPS = [0.01, 0.025, 0.05] as const;

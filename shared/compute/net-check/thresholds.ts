/**
 * A cell is told as poor when its shape alone moves one of its head lines by a fifth of the head it is drawn for: for a
 * whole drop, shared between its two lines, the tenth that is flagged between two readings of one point. Texts ask for
 * cells that look square and give no figure; this one is common practice with no source.
 */
export const CELL_TOLD = 0.2;

/** An angle is told when it alone moves the head half a cell away by a tenth of a drop: 11 degrees off for squares. */
export const ANGLE_TOLD = 0.1;

/**
 * What is told must hold after this many standard deviations of the tracing accuracy are taken off. Angles at the ends
 * of lines carry besides what a parabola cannot follow, hence the greater number for them.
 */
export const CELL_SURE = 2;
export const ANGLE_SURE = 3;

/** An angle known no better than this, in degrees at 95 %, is not judged: the cells are too small for the tracing. */
export const ANGLE_KNOWN_DEG = 30;

/** Channels whose flows differ by more than this part are told: as much as a cell may be off. */
export const CHANNEL_TOLD = 0.2;

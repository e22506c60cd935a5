const LOOK = 'touch text-sm text-ink-2 underline decoration-rule underline-offset-2 hover:text-ink';

/** A small action beside or below texts. */
export const ACTION = `${LOOK} pointer-fine:min-h-6`;
/** One within a text: as high as its line, and on touch screens pressed within 40 px without parting the lines. */
export const ACTION_AMONG_WORDS = `${LOOK} pointer-coarse:-my-3`;

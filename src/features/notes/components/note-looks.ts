/** A small action among texts. */
export const ACTION = 'touch text-sm text-ink-2 underline decoration-rule underline-offset-2 hover:text-ink';

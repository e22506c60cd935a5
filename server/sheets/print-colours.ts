/** Colours of what is printed beside the lines. */
export const INK = '#1c2733';
export const GREY = '#5b6570';
export const RULE = '#b9c2c8';

/**
 * The window's widths at which a page is laid out otherwise, where the styles' own breakpoints do not reach. The same
 * as `md` and `lg` there, in rem of the letters that are set in the browser.
 */
export const NARROW_QUERY = '(width < 51.25rem)';
export const ROOMY_QUERY = '(width >= 67.5rem)';

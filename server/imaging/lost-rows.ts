import type { Sharp } from 'sharp';

/** Scanners now and then count a few rows too many. */
const LOST_SHARE = 0.005;

/**
 * Counts the rows that were missing while `image` was decoded. Fax data that end too early are no error to libtiff:
 * it shows the rest of the page white and warns once for each row. A page with its lower half gone would look like
 * a good one.
 */
export function countLostRows(image: Sharp): { rows(): number } {
  let rows = 0;
  image.on('warning', (message: string) => {
    if (message.startsWith('Premature EOF')) rows++;
  });
  return { rows: () => rows };
}

export function isCutShort(lostRows: number, heightPx: number): boolean {
  return lostRows > heightPx * LOST_SHARE;
}

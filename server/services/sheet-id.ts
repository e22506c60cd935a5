import { createHash } from 'node:crypto';

/**
 * The id of a drawing's page as a sheet: always the same one, so that a run that was cut off after its tiles were
 * put in place is repeated over them and leaves nothing that nobody refers to. Version 7 in form (RFC 9562): the
 * drawing's own time, then bits of a hash instead of random ones.
 */
export function sheetIdOf(drawingId: string, pageNumber: number): string {
  const hash = createHash('sha256').update(`${drawingId}/${pageNumber}`).digest('hex');
  const time = drawingId.slice(0, 13);
  const variant = ((Number.parseInt(hash.slice(3, 4), 16) & 0x3) | 0x8).toString(16);
  return `${time}-7${hash.slice(0, 3)}-${variant}${hash.slice(4, 7)}-${hash.slice(7, 19)}`;
}

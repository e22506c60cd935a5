/**
 * Share (0 to 1) of pixels equal to their left neighbour in every channel. `data`: rows of `width` pixels of
 * `channels` bytes each, the first `compared` of which count. Line work lies above 0.9, a grey or colour scan with
 * paper grain below 0.6. Returns 1 for an image one pixel wide.
 */
export function flatShare(data: Uint8Array, width: number, channels: number, compared: number): number {
  const rows = Math.floor(data.length / (width * channels));
  if (width < 2 || rows === 0) return 1;
  let equal = 0;
  for (let row = 0; row < rows; row++) {
    const start = row * width * channels;
    const end = start + width * channels;
    for (let at = start + channels; at < end; at += channels) {
      let same = 1;
      for (let c = 0; c < compared; c++) if (data[at + c] !== data[at + c - channels]) same = 0;
      equal += same;
    }
  }
  return equal / (rows * (width - 1));
}

/** Above this share PNG tiles are smaller than JPEG ones and lose nothing. */
export const LINE_WORK_SHARE = 0.8;

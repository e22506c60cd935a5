import type { RenditionSettings } from '#shared/contract/renditions.ts';

/** Rows of pixels of one or three bytes each. */
export type PixelRows = {
  readonly data: Uint8Array | Uint8ClampedArray;
  readonly widthPx: number;
  readonly heightPx: number;
  /** 1 grey, 3 RGB, 4 RGB with an opacity that is left alone. */
  readonly channels: 1 | 3 | 4;
};

/** What a pixel at least as light as this may be is no speck, where no threshold says it. */
const SPECK_BELOW = 160;

/** Brightness 0 to 255 of a colour. Source: Rec. ITU-R BT.601, 2.5.1, in 256ths. */
export function brightness(red: number, green: number, blue: number): number {
  return (77 * red + 150 * green + 29 * blue) >> 8;
}

/** For each tone what it becomes when `black` is made black and `white` white; a step where they coincide. */
export function levelTable({ black, white }: Pick<RenditionSettings, 'black' | 'white'>): Uint8Array {
  return Uint8Array.from({ length: 256 }, (_, tone) => {
    if (tone <= black) return 0;
    if (tone >= white) return 255;
    return Math.round((255 * (tone - black)) / (white - black));
  });
}

/** For each tone what the threshold and the inversion make of it. */
export function endTable({ threshold, invert }: Pick<RenditionSettings, 'threshold' | 'invert'>): Uint8Array {
  return Uint8Array.from({ length: 256 }, (_, tone) => {
    const cut = threshold === null ? tone : tone < threshold ? 0 : 255;
    return invert ? 255 - cut : cut;
  });
}

/** Below which tone, after the levels, a pixel may belong to a speck. */
export function speckTone({ threshold }: Pick<RenditionSettings, 'threshold'>): number {
  return threshold ?? SPECK_BELOW;
}

/** Each colour of each pixel by a table; colours become grey first where there is a threshold. In place. */
export function applyTable({ data, channels }: PixelRows, table: Uint8Array): void {
  const colours = channels === 4 ? 3 : channels;
  for (let at = 0; at < data.length; at += channels)
    for (let colour = 0; colour < colours; colour += 1) data[at + colour] = table[data[at + colour]!]!;
}

/** Colours made grey, in place. */
export function makeGrey({ data, channels }: PixelRows): void {
  if (channels === 1) return;
  for (let at = 0; at < data.length; at += channels) {
    const grey = brightness(data[at]!, data[at + 1]!, data[at + 2]!);
    data[at] = grey;
    data[at + 1] = grey;
    data[at + 2] = grey;
  }
}

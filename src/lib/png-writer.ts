/**
 * Writes a PNG row by row, so that a large picture is never held whole: only a few rows of pixels and the compressed
 * bytes are in memory. 8-bit RGB, each row filtered against the one above (PNG specification, third edition, 9.2).
 */
export type PngWriter = {
  /** Takes whole rows as RGBA; what is not opaque is taken as if it lay on white already. */
  rows(rgba: Uint8ClampedArray): Promise<void>;
  /** Ends the file. All rows must have been given. */
  end(): Promise<Blob>;
  /** Gives the work up. */
  abort(): void;
};

const SIGNATURE = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];
const DEPTH_BITS = 8;
const TRUECOLOUR = 2;
const FILTER_UP = 2;
const PER_METRE = 1;

export function createPngWriter(widthPx: number, heightPx: number, dpi: number): PngWriter {
  const deflate = new CompressionStream('deflate');
  const source = deflate.writable.getWriter();
  const parts: BlobPart[] = [];
  const drained = drain(deflate.readable, parts);
  // A failure is told by whoever waits for it; until then it must not count as unhandled.
  drained.catch(() => {});
  const stride = widthPx * 3;
  let above = new Uint8Array(stride);
  let given = 0;

  return {
    async rows(rgba) {
      const count = rgba.length / (widthPx * 4);
      const filtered = new Uint8Array(count * (stride + 1));
      for (let row = 0; row < count; row += 1) {
        const own = rgbOf(rgba, row * widthPx * 4, stride);
        const start = row * (stride + 1);
        filtered[start] = FILTER_UP;
        for (let i = 0; i < stride; i += 1) filtered[start + 1 + i] = own[i]! - above[i]!;
        above = own;
      }
      given += count;
      await source.write(filtered);
    },
    async end() {
      if (given !== heightPx) throw new Error(`A picture of ${heightPx} rows was given ${given}.`);
      await source.close();
      await drained;
      const head = [new Uint8Array(SIGNATURE), header(widthPx, heightPx), resolution(dpi)];
      return new Blob([...(head as BlobPart[]), ...parts, chunk('IEND', new Uint8Array(0)) as BlobPart], {
        type: 'image/png',
      });
    },
    abort: () => void source.abort().catch(() => {}),
  };
}

async function drain(readable: ReadableStream<Uint8Array>, parts: BlobPart[]): Promise<void> {
  const reader = readable.getReader();
  for (;;) {
    const { done, value } = await reader.read();
    if (done) return;
    parts.push(chunk('IDAT', value) as BlobPart);
  }
}

function rgbOf(rgba: Uint8ClampedArray, from: number, stride: number): Uint8Array<ArrayBuffer> {
  const rgb = new Uint8Array(stride);
  for (let i = 0, j = from; i < stride; i += 3, j += 4) {
    rgb[i] = rgba[j]!;
    rgb[i + 1] = rgba[j + 1]!;
    rgb[i + 2] = rgba[j + 2]!;
  }
  return rgb;
}

function header(widthPx: number, heightPx: number): Uint8Array {
  const data = new Uint8Array(13);
  const view = new DataView(data.buffer);
  view.setUint32(0, widthPx);
  view.setUint32(4, heightPx);
  data[8] = DEPTH_BITS;
  data[9] = TRUECOLOUR;
  return chunk('IHDR', data);
}

/** Pixels per metre, by which other programs tell how large the picture is on paper. */
function resolution(dpi: number): Uint8Array {
  const data = new Uint8Array(9);
  const view = new DataView(data.buffer);
  const perMetre = Math.round(dpi / 0.0254);
  view.setUint32(0, perMetre);
  view.setUint32(4, perMetre);
  data[8] = PER_METRE;
  return chunk('pHYs', data);
}

function chunk(type: string, data: Uint8Array): Uint8Array {
  const bytes = new Uint8Array(data.length + 12);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, data.length);
  for (let i = 0; i < 4; i += 1) bytes[4 + i] = type.charCodeAt(i);
  bytes.set(data, 8);
  view.setUint32(8 + data.length, crc32(bytes.subarray(4, 8 + data.length)));
  return bytes;
}

const CRC_TABLE = Uint32Array.from({ length: 256 }, (_, n) => {
  let c = n;
  for (let k = 0; k < 8; k += 1) c = c & 1 ? 0xedb88320 ^ (c >>> 1) : c >>> 1;
  return c >>> 0;
});

function crc32(bytes: Uint8Array): number {
  let crc = 0xffffffff;
  for (const byte of bytes) crc = CRC_TABLE[(crc ^ byte) & 0xff]! ^ (crc >>> 8);
  return (crc ^ 0xffffffff) >>> 0;
}

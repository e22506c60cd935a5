type Rgb = readonly [number, number, number];

function rgbOf(hex: string): Rgb {
  const found = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i.exec(hex);
  if (!found) throw new Error(`${hex} is no colour of six digits.`);
  return [1, 2, 3].map((at) => Number.parseInt(found[at]!, 16)) as unknown as Rgb;
}

/** A colour painted over another with a strength of 0 to 1, mixed as canvases mix. */
export function mixed(over: string, alpha: number, under: string): string {
  const [a, b] = [rgbOf(over), rgbOf(under)];
  const parts = a.map((part, i) => Math.round(part * alpha + b[i]! * (1 - alpha)));
  return `#${parts.map((part) => part.toString(16).padStart(2, '0')).join('')}`;
}

/** Relative luminance of a colour in sRGB as WCAG 2.2 defines it. */
function luminance(hex: string): number {
  const [red, green, blue] = rgbOf(hex).map((part) => {
    const share = part / 255;
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  }) as unknown as Rgb;
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

/** Contrast ratio of two colours, 1 to 21 (WCAG 2.2, "contrast ratio"). */
export function contrast(a: string, b: string): number {
  const [dark, light] = [luminance(a), luminance(b)].sort((x, y) => x - y) as [number, number];
  return (light + 0.05) / (dark + 0.05);
}

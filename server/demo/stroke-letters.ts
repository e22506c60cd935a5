/**
 * A single-stroke alphabet of our own, so that the demo's lettering needs no font on the machine. Glyphs stand on
 * a grid of 4 wide and 6 high (y up); strokes are separated by spaces, points by dashes of digit pairs.
 */
const GLYPHS: Record<string, string> = {
  A: '00-26-40 12-32',
  B: '00-06-26-35-34-23-03 23-32-31-20-00',
  C: '45-36-16-05-01-10-30-41',
  D: '00-06-26-45-41-20-00',
  E: '46-06-00-40 03-33',
  F: '46-06-00 03-33',
  G: '45-36-16-05-01-10-30-41-43-23',
  H: '00-06 40-46 03-43',
  I: '20-26',
  J: '46-41-30-10-01',
  K: '00-06 46-03-40',
  L: '06-00-40',
  M: '00-06-23-46-40',
  N: '00-06-40-46',
  O: '16-05-01-10-30-41-45-36-16',
  P: '00-06-36-45-44-33-03',
  Q: '16-05-01-10-30-41-45-36-16 22-40',
  R: '00-06-36-45-44-33-03 23-40',
  S: '45-36-16-05-04-13-33-42-41-30-10-01',
  T: '06-46 26-20',
  U: '06-01-10-30-41-46',
  V: '06-20-46',
  W: '06-10-23-30-46',
  X: '00-46 06-40',
  Y: '06-23-46 23-20',
  Z: '06-46-00-40',
  '0': '16-05-01-10-30-41-45-36-16',
  '1': '14-26-20 10-30',
  '2': '05-16-36-45-44-00-40',
  '3': '06-46-23-33-42-41-30-10-01',
  '4': '30-36-02-42',
  '5': '46-06-03-33-42-41-30-10-01',
  '6': '46-16-03-01-10-30-41-42-33-03',
  '7': '06-46-10',
  '8': '13-04-05-16-36-45-44-33-13-02-01-10-30-41-42-33',
  '9': '00-30-43-45-36-16-05-04-13-43',
  '.': '20-21',
  ',': '21-10',
  ':': '21-22 24-25',
  '-': '13-33',
  '/': '00-46',
  '=': '02-42 04-44',
  '+': '13-33 22-24',
  '(': '36-24-22-30',
  ')': '16-24-22-10',
  "'": '25-26',
};

/** Advance from one letter to the next and width of a space, in grid units. */
const ADVANCE = 5.6;

/**
 * The strokes of a line of text, starting at (0, 0), y up, in units of the letters' height.
 * Letters are drawn as capitals; a sign without a glyph leaves a gap.
 */
export function lettering(text: string): Array<Array<[number, number]>> {
  const strokes: Array<Array<[number, number]>> = [];
  [...text.toUpperCase()].forEach((sign, index) => {
    for (const stroke of GLYPHS[sign]?.split(' ') ?? [])
      strokes.push(
        stroke
          .split('-')
          .map((pair) => [(Number(pair[0]) + index * ADVANCE) / 6, Number(pair[1]) / 6] as [number, number]),
      );
  });
  return strokes;
}

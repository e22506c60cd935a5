/** Where the one picture of a page is painted, in the page's own coordinates: `[left, bottom, width, height]`. */
export interface PlacedPicture {
  name: string;
  rect: [number, number, number, number];
}

type Matrix = [number, number, number, number, number, number];
type Operands = Array<number | string>;

interface State {
  matrix: Matrix;
  textMode: number;
}

/** Operators that set what is not used when nothing is drawn but a picture, or mark parts of the content. */
const HARMLESS = new Set(
  (
    'w J j M d ri i n W W* re m l c v y h g G rg RG k K cs CS sc SC scn SCN BMC EMC MP DP BX EX ' +
    'BT ET Tc Tw Tz TL Tf Ts Td TD Tm T*'
  ).split(' '),
);
const SHOWS_TEXT = new Set(['Tj', 'TJ', "'", '"']);
const INVISIBLE = 3;

/**
 * The picture of a page that shows one picture and nothing else but text in invisible letters, as scanners with text
 * recognition write it; null for every other page, and when in doubt. `mayPaint` looks at a graphics state's name.
 */
export function lonePicture(
  content: string,
  mayPaint: (graphicsState: string) => boolean,
): PlacedPicture | null {
  let state: State = { matrix: [1, 0, 0, 1, 0, 0], textMode: 0 };
  const saved: State[] = [];
  let placed: PlacedPicture | null = null;
  for (const { operator, operands } of operationsOf(content)) {
    if (operator === 'q') saved.push(state);
    else if (operator === 'Q') state = saved.pop() ?? state;
    else if (operator === 'cm') state = { ...state, matrix: multiplied(state.matrix, operands) };
    else if (operator === 'Tr') state = { ...state, textMode: Number(operands[0]) };
    else if (operator === 'gs') {
      if (!mayPaint(String(operands[0]))) return null;
    } else if (operator === 'BDC') {
      // Optional content may be switched off.
      if (operands[0] === '/OC') return null;
    } else if (operator === 'Do') {
      const picture = upright(String(operands[0]), state.matrix);
      if (placed || !picture) return null;
      placed = picture;
    } else if (SHOWS_TEXT.has(operator)) {
      if (state.textMode !== INVISIBLE) return null;
    } else if (!HARMLESS.has(operator)) return null;
  }
  return placed;
}

function upright(name: string, [a, b, c, d, e, f]: Matrix): PlacedPicture | null {
  const skew = 1e-4 * Math.max(Math.abs(a), Math.abs(d));
  if (!(a > 0 && d > 0) || Math.abs(b) > skew || Math.abs(c) > skew) return null;
  return { name: name.slice(1), rect: [e, f, a, d] };
}

function multiplied([a, b, c, d, e, f]: Matrix, by: Operands): Matrix {
  const [A = 1, B = 0, C = 0, D = 1, E = 0, F = 0] = by.map(Number);
  return [a * A + c * B, b * A + d * B, a * C + c * D, b * C + d * D, a * E + c * F + e, b * E + d * F + f];
}

/** Tokens of a content stream (ISO 32000-1, 7.2 and 7.8): strings, arrays and dictionaries count as one each. */
const TOKEN =
  /%[^\r\n]*|\((?:\\[\s\S]|[^\\()]|\((?:\\[\s\S]|[^\\()])*\))*\)|<<|>>|<[0-9a-fA-F\s]*>|[[\]]|\/[^\s()<>[\]{}/%]*|[^\s()<>[\]{}/%]+/g;

function* operationsOf(content: string): Generator<{ operator: string; operands: Operands }> {
  let operands: Operands = [];
  let depth = 0;
  for (const [token] of content.matchAll(TOKEN)) {
    if (token.startsWith('%')) continue;
    if (token === '[' || token === '<<') depth++;
    else if (token === ']' || token === '>>') depth--;
    else if (depth > 0) continue;
    else if (/^[(</]/.test(token)) operands.push(token);
    else if (/^[+-]?(\d+\.?\d*|\.\d+)$/.test(token)) operands.push(Number(token));
    else {
      yield { operator: token, operands };
      operands = [];
    }
  }
}

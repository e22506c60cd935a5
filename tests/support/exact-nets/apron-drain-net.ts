import type { ExactLine, ExactNet, ExactPlace } from '#shared/compute/exact/exact-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { withLines } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument, type Tracing } from '#tests/support/exact-nets/exact-net-document.ts';

type Complex = readonly [re: number, im: number];

export type ApronDrainNet = Pick<ExactNet, 'headwater' | 'tailwater' | 'drops' | 'lines' | 'headAt'> & {
  readonly drainHead: number;
  readonly tailwater: number;
  readonly headPerDrop: number;
  /** Channels, of the traced squares, from the headwater, into the drain, and into the tailwater less what it gives. */
  readonly flows: { readonly headwater: number; readonly drain: number; readonly tailwater: number };
  /** Places in the ground off every boundary, evenly spread over the half strip onto which the section is mapped. */
  readonly places: (count: number, random: () => number) => ExactPlace[];
};

/** Half width of the apron, and where its middle lies. */
const HALF = 10;
const MIDDLE: ExactPlace = [0, 98];
/** Depth of the outermost flow line at the headwater bed in the half strip. */
const DEEP = 2.2;
/** Place of the drain along the apron in the half strip, from −π/2 at the headwater to π/2 at the tailwater. */
const DRAIN = 0.6;

/**
 * A flat apron on deep ground with a drain let into its base that is held below the tailwater: water runs from the
 * headwater to both, and from part of the tailwater bed back to the drain. With z = b·sin ζ the ground below the apron
 * becomes a half strip, in which the drain is a sink beside its images in the two beds:
 *
 * h + iψ = T + (H − T)(1/2 − ζ/π) + S·ln(sin((ζ − ζ0)/2) / cos((ζ + ζ0)/2)).
 *
 * Both beds have one head and the apron carries no flow, term by term; the drain is drawn along the equipotential of its
 * head. Own derivation by the method of images (Muskat 1937), after Harr (1962) for the apron.
 */
export function apronDrainNet(levels: { tailwater: number; drainHead: number }): ApronDrainNet {
  const headwater = 106;
  const headPerDrop = 0.5;
  const intoDrain = 10;
  const { tailwater, drainHead } = levels;
  const S = (intoDrain * headPerDrop) / Math.PI;
  const field = fieldOf(headwater, tailwater, S);
  const drops = (headwater - drainHead) / headPerDrop;
  const toPlace = ([re, im]: Complex): ExactPlace => [
    MIDDLE[0] + HALF * Math.sin(re) * Math.cosh(im),
    MIDDLE[1] + HALF * Math.cos(re) * Math.sinh(im),
  ];
  const line = (kind: ExactLine['line'], points: Complex[], water: ExactLine['water'] = null): ExactLine => ({
    line: kind,
    water,
    at: (part) => toPlace(along(points, part)),
  });
  const isMet = (head: number) => (at: Complex) => head < tailwater - 1e-9 && at[1] > 0 && at[0] > DRAIN;
  const stream = (from: Complex) =>
    march(
      field,
      from,
      'down',
      (at) =>
        at[0] > Math.PI / 2 || field.potential(at)[0] < drainHead || Math.hypot(at[0] - DRAIN, at[1]) < 0.01,
    );
  const deepest = stream([-Math.PI / 2, -DEEP]);
  const below = (at: Complex) => at[1] < depthOf(deepest, at[0]);
  const contour = (head: number) =>
    march(field, apronAt(field, head), 'across', (at) => isMet(head)(at) || below(at) || at[0] > Math.PI / 2);
  // Just below the apron, where the angle at the drain is that of the ground.
  const top = field.potential([-Math.PI / 2, -1e-12])[1];
  const parting = halved(-1e-9, -DEEP, (y) => field.slope([Math.PI / 2, y])[0] > 0);
  const intoDrainFromHeadwater = (field.potential([Math.PI / 2, parting])[1] - top) / headPerDrop;
  const channels = (field.potential([-Math.PI / 2, -DEEP])[1] - top) / headPerDrop;
  const fromHeadwater = Array.from({ length: Math.ceil(channels - 0.05) - 1 }, (_, i) =>
    stream([-Math.PI / 2, bedDepth(field, -Math.PI / 2, [0, -DEEP], top + (i + 1) * headPerDrop)]),
  );
  const fromTailwater = Array.from({ length: intoDrain - 1 }, (_, i) => i + 1)
    .filter((channel) => channel > intoDrainFromHeadwater)
    .map((channel) =>
      stream([Math.PI / 2, bedDepth(field, Math.PI / 2, [parting, 0], top + channel * headPerDrop)]),
    );
  const drain = contour(drainHead);
  const edges: [Complex, Complex] = [drain[0]!, drain[drain.length - 1]!];
  const end = deepest[deepest.length - 1]!;
  const lines: ExactLine[] = [
    line(
      'submergedFace',
      [
        [-Math.PI / 2, 0],
        [-Math.PI / 2, -DEEP],
      ],
      'headwater',
    ),
    line(
      'submergedFace',
      [
        [Math.PI / 2, 0],
        [Math.PI / 2, Math.min(end[1], -DEEP)],
      ],
      'tailwater',
    ),
    line('impervious', [[-Math.PI / 2, 0], edges[0]]),
    line('impervious', [edges[1], [Math.PI / 2, 0]]),
    line('drain', drain),
    ...Array.from({ length: Math.ceil(drops - 0.05) - 1 }, (_, i) =>
      line('equipotential', contour(headwater - (i + 1) * headPerDrop)),
    ),
    ...[...fromHeadwater, ...fromTailwater, deepest].map((points) => line('flowLine', points)),
  ];
  return {
    headwater,
    tailwater,
    drainHead,
    drops,
    headPerDrop,
    lines,
    flows: {
      headwater: channels,
      drain: intoDrain,
      tailwater: channels - intoDrain,
    },
    headAt: (offset, elevation) => field.potential(fromPlace(offset, elevation))[0],
    places: (count, random) => {
      const found: ExactPlace[] = [];
      while (found.length < count) {
        const at: Complex = [(random() - 0.5) * 0.96 * Math.PI, -(0.02 + random() * DEEP)];
        if (!below(at) && field.potential(at)[0] > drainHead + 0.05 * headPerDrop) found.push(toPlace(at));
      }
      return found;
    },
  };
}

/** The net traced on a sheet, the drain held at its head. */
export function apronDrainDocument(net: ApronDrainNet, tracing: Tracing = {}): FlowNetDocument {
  return withLines(exactNetDocument(net, { pxPerUnit: 50, ...tracing }), 'drain', (value) => ({
    ...value,
    head: net.drainHead * (tracing.lengthFactor ?? 1),
  }));
}

type Field = { potential: (at: Complex) => Complex; slope: (at: Complex) => Complex };

function fieldOf(headwater: number, tailwater: number, S: number): Field {
  const lost = headwater - tailwater;
  return {
    potential: (at) => {
      const near = halfSine([at[0] - DRAIN, at[1]]);
      const far = halfCosine([at[0] + DRAIN, at[1]]);
      return [
        tailwater + lost * (0.5 - at[0] / Math.PI) + S * Math.log(Math.hypot(...near) / Math.hypot(...far)),
        S * (Math.atan2(near[1], near[0]) - Math.atan2(far[1], far[0])) - (lost * at[1]) / Math.PI,
      ];
    },
    // d/dζ: −(H − T)/π + (S/2)·(cot((ζ − ζ0)/2) + tan((ζ + ζ0)/2))
    slope: (at) => {
      const cot = divided(halfCosine([at[0] - DRAIN, at[1]]), halfSine([at[0] - DRAIN, at[1]]));
      const tan = divided(halfSine([at[0] + DRAIN, at[1]]), halfCosine([at[0] + DRAIN, at[1]]));
      return [(S / 2) * (cot[0] + tan[0]) - lost / Math.PI, (S / 2) * (cot[1] + tan[1])];
    },
  };
}

const halfSine = ([x, y]: Complex): Complex => [
  Math.sin(x / 2) * Math.cosh(y / 2),
  Math.cos(x / 2) * Math.sinh(y / 2),
];
const halfCosine = ([x, y]: Complex): Complex => [
  Math.cos(x / 2) * Math.cosh(y / 2),
  -Math.sin(x / 2) * Math.sinh(y / 2),
];

function divided([a, b]: Complex, [c, d]: Complex): Complex {
  const square = c * c + d * d;
  return [(a * c + b * d) / square, (b * c - a * d) / square];
}

/** The place in the half strip of a place of the section, ζ = arcsin(z/b). */
function fromPlace(offset: number, elevation: number): Complex {
  const z: Complex = [(offset - MIDDLE[0]) / HALF, (elevation - MIDDLE[1]) / HALF];
  // ζ = −i·ln(iz + √(1 − z²)), with the root that keeps the lower half plane in the half strip.
  const square: Complex = [1 - (z[0] * z[0] - z[1] * z[1]), -2 * z[0] * z[1]];
  const size = Math.sqrt(Math.hypot(...square));
  const half = Math.atan2(square[1], square[0]) / 2;
  const sum: Complex = [-z[1] + size * Math.cos(half), z[0] + size * Math.sin(half)];
  return [Math.atan2(sum[1], sum[0]), -Math.log(Math.hypot(...sum))];
}

/** Where the apron between the headwater and the drain has a head, by halving: there the head falls all the way. */
function apronAt(field: Field, head: number): Complex {
  return [halved(-Math.PI / 2, DRAIN, (x) => field.potential([x, 0])[0] > head), 0];
}

/** Depth at which a bed has a value of the stream function, which grows from the first depth to the second. */
function bedDepth(field: Field, x: number, [from, to]: readonly [number, number], value: number): number {
  return halved(from, to, (y) => field.potential([x, y])[1] < value);
}

function halved(low: number, high: number, isBefore: (at: number) => boolean): number {
  let [a, b] = [low, high];
  for (let i = 0; i < 80; i += 1) {
    const middle = (a + b) / 2;
    if (isBefore(middle)) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

/**
 * Follows an equipotential downwards from the apron, or a flow line down the head, by small steps of the fourth order
 * (Kutta 1901) until `isOver`; the last point is brought back to where it is.
 */
function march(
  field: Field,
  from: Complex,
  way: 'across' | 'down',
  isOver: (at: Complex) => boolean,
): Complex[] {
  const STEP = 0.004;
  const direction = (at: Complex): Complex => {
    const [a, b] = field.slope(at);
    const size = Math.hypot(a, b);
    // The head falls along −(a, −b); an equipotential runs square to that.
    return way === 'down' ? [-a / size, b / size] : [-b / size, -a / size];
  };
  const sign = way === 'across' && direction([from[0], from[1] - 1e-6])[1] > 0 ? -1 : 1;
  const stepped = (at: Complex, size: number): Complex => {
    const go = (d: Complex, part: number): Complex => [
      at[0] + sign * size * part * d[0],
      at[1] + sign * size * part * d[1],
    ];
    const k1 = direction(at);
    const k2 = direction(go(k1, 0.5));
    const k3 = direction(go(k2, 0.5));
    const k4 = direction(go(k3, 1));
    const mean: Complex = [
      (k1[0] + 2 * k2[0] + 2 * k3[0] + k4[0]) / 6,
      (k1[1] + 2 * k2[1] + 2 * k3[1] + k4[1]) / 6,
    ];
    return go(mean, 1);
  };
  const points: Complex[] = [from];
  for (let i = 0; i < 4000; i += 1) {
    const here = points[points.length - 1]!;
    const next = stepped(here, STEP);
    if (i > 2 && isOver(next)) {
      points.push(
        stepped(
          here,
          halved(0, STEP, (part) => !isOver(stepped(here, part))),
        ),
      );
      break;
    }
    points.push(next);
  }
  return points;
}

/** Depth of a flow line below the middle at a place across the half strip. */
function depthOf(points: readonly Complex[], x: number): number {
  const i = points.findIndex((point) => point[0] >= x);
  const after = points[i === -1 ? points.length - 1 : i]!;
  const before = points[Math.max(0, (i === -1 ? points.length : i) - 1)]!;
  const span = after[0] - before[0];
  return span > 0 ? before[1] + ((x - before[0]) / span) * (after[1] - before[1]) : after[1];
}

function along(points: readonly Complex[], part: number): Complex {
  const at = part * (points.length - 1);
  const i = Math.min(points.length - 2, Math.floor(at));
  const [a, b] = [points[i]!, points[i + 1]!];
  return [a[0] + (at - i) * (b[0] - a[0]), a[1] + (at - i) * (b[1] - a[1])];
}

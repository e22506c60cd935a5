import { angleBetween } from '#shared/compute/cells/quadrilateral.ts';
import { type Contribution, halfWidth, weightedSum } from '#shared/compute/doubt/contributions.ts';
import { basicParabolaHead, basicParabolaSeepage } from '#shared/compute/exact/basic-parabola.ts';
import { flatApronHead } from '#shared/compute/exact/flat-apron.ts';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import { sheetPileNet } from '#shared/compute/exact/sheet-pile-net.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { ringOf, signedArea } from '#shared/compute/geometry/polygon.ts';
import { polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { ControlPair } from '#shared/compute/known-places.ts';
import { countDrops } from '#shared/compute/net/count.ts';
import { seepagePerRun } from '#shared/compute/net/seepage.ts';
import {
  correctedEntry,
  focalOrdinate,
  parabolaHeight,
  parabolaOnFace,
} from '#shared/compute/phreatic/base-parabola.ts';
import { breakoutCorrection, flatSlopeBreakout } from '#shared/compute/phreatic/breakout.ts';
import { seepageAlong } from '#shared/compute/quantities/average-end.ts';
import { creepLength, creepRatio } from '#shared/compute/quantities/creep.ts';
import {
  criticalGradient,
  pressureRatio,
  saturatedFrom,
  seepageForce,
} from '#shared/compute/quantities/gradients.ts';
import { blowUp, heaveFactor, meanOverBase } from '#shared/compute/quantities/heave.ts';
import { type PublishedValue, publishedValues } from '#shared/compute/quantities/published-values.ts';
import { flowIn, seepagePerMetre } from '#shared/compute/quantities/seepage-volume.ts';
import { resultantOf } from '#shared/compute/quantities/uplift.ts';
import {
  fitSimilarity,
  similarityForward,
  similarityResidual,
  similarityRotation,
  similarityScale,
} from '#shared/compute/similarity.ts';
import { CUSTOMARY_GAMMA_W } from '#shared/compute/single-inputs.ts';
import { commonAnisotropy } from '#shared/compute/soils/anisotropy.ts';
import { refracted, refractionOfFlow } from '#shared/compute/soils/refraction.ts';
import { equivalentK } from '#shared/compute/soils/soil-list.ts';
import {
  KILOPASCALS_PER_PSF,
  KN_PER_M3_PER_PCF,
  METRES_PER_FOOT,
  NEWTONS_PER_POUND_FORCE,
  permeabilityInMetresPerSecond,
  permeabilityPerSecond,
} from '#shared/compute/units.ts';
import { type PermeabilityUnit, UNSAID } from '#shared/contract/document.ts';
import { inputOf, type PublishedCase } from './published-cases.ts';

/** What the engine gives for a case, under the names of the expected values. */
export type Runner = (published: PublishedCase) => Record<string, number>;

const radians = (degrees: number) => (degrees * Math.PI) / 180;
const degrees = (angle: number) => (angle * 180) / Math.PI;
const list = ({ inputs }: PublishedCase, name: string) => inputs[name] as readonly number[];
const places = ({ inputs }: PublishedCase, name: string) => inputs[name] as readonly Pair[];

const soilOf = (k: number, kv: number, unit: PermeabilityUnit) => ({
  kind: 'permeability' as const,
  ...UNSAID.soil,
  k,
  kv,
  unit,
  factor: null,
  source: '',
});

/** x factor and equivalent permeability of a soil, as the engine transforms it. */
function transformed(kx: number, kz: number, unit: PermeabilityUnit = 'm/s') {
  const value = soilOf(kx, kz, unit);
  const { ratio } = commonAnisotropy([value], null);
  const kh = permeabilityInMetresPerSecond(kx, unit);
  const k = equivalentK({ id: null, label: '', kh, kv: kh / ratio, dipDeg: 0, places: [], value });
  return { factor: Math.sqrt(1 / ratio), k: k! };
}

const halfSpacePile = (depth: number, head: number) =>
  sheetPileNet({ depth, headwater: head, tailwater: 0, drops: 10, channels: 4, head: [0, 0] });

const apronUplift: Runner = (published) => {
  const [b, H, gammaW] = ['b', 'H', 'γw'].map((name) => inputOf(published, name)) as [number, number, number];
  // Nodes crowd towards both edges, where the head falls as the root of the distance.
  const samples = Array.from({ length: 4001 }, (_, i) => (-b / 2) * Math.cos((Math.PI * i) / 4000));
  const resultant = resultantOf(
    samples.map((x) => ({ offset: x, elevation: 0, pressure: gammaW * flatApronHead({ b, H }, x, 0) })),
  );
  return { uplift_force: resultant.vertical, arm_from_upstream_edge_over_b: resultant.arm! / b };
};

const kozeny: Runner = (published) => {
  const [d, H] = [inputOf(published, 'd'), inputOf(published, 'H')];
  const S = focalOrdinate(d, H);
  const k = typeof published.inputs.k === 'number' ? published.inputs.k : 1;
  const x = typeof published.inputs.x === 'number' ? published.inputs.x : 0;
  return {
    S,
    q: k * basicParabolaSeepage({ S, H }),
    q_over_k: basicParabolaSeepage({ S, H }),
    two_S: 2 * S,
    S_squared: S * S,
    y_at_x: parabolaHeight(S, x),
    y_at_x0: parabolaHeight(S, 0),
    y_at_x20: parabolaHeight(S, 20),
    h_on_base_x20: basicParabolaHead({ S, H }, 20, 0)!,
  };
};

const breakout: Runner = (published) => {
  const [d, H, alpha] = ['d', 'H', 'alpha'].map((name) => inputOf(published, name)) as [
    number,
    number,
    number,
  ];
  return {
    a_schaffernak: flatSlopeBreakout(d, H, radians(alpha))!,
    a_plus_delta_a: parabolaOnFace(focalOrdinate(d, H), radians(alpha)),
  };
};

const refraction: Runner = (published) => {
  const isotropic = (k: number) => ({ xx: k, xy: 0, yy: k });
  const law = refractionOfFlow(
    isotropic(inputOf(published, 'k1')),
    isotropic(inputOf(published, 'k2')),
    [1, 0],
  );
  return { alpha2: degrees(refracted(law, radians(inputOf(published, 'alpha1 from the normal')))) };
};

const critical: Runner = (published) => {
  const [Gs, e] = [inputOf(published, 'Gs'), inputOf(published, 'e')];
  const weight = { saturatedUnitWeight: null, moistUnitWeight: null, specificGravity: Gs, voidRatio: e };
  return {
    i_c: criticalGradient(weight, CUSTOMARY_GAMMA_W.SI)!,
    gamma_sat: saturatedFrom(Gs, e, CUSTOMARY_GAMMA_W.SI),
  };
};

/** Values of the table under the names of a case, by the table's own names. */
function tabled(about: PublishedValue['about'], named: (value: PublishedValue) => Array<[string, number]>) {
  return () => Object.fromEntries(publishedValues(about).flatMap(named));
}

const fromTo =
  (low: string, high: string) =>
  ({ name, from, to }: PublishedValue): Array<[string, number]> => [
    [`${name}${low}`, from],
    [`${name}${high}`, to],
  ];

const conversion =
  (name: string, value: () => number): Runner =>
  () => ({ [name]: value() });
const oneGallon = () => 86_400 / flowIn('gal/day', 1, 'SI');

const setOutOf = (published: PublishedCase, image: string, world: string): ControlPair[] =>
  places(published, image).map((sheet, i) => ({ sheet, section: places(published, world)[i]! }));

const twoPoints: Runner = (published) => {
  const fit = fitSimilarity(setOutOf(published, 'image col,row', 'world x,z'), false)!;
  const [probe_x, probe_z] = similarityForward(fit, ...places(published, 'probe col,row')[0]!);
  return { scale: similarityScale(fit), rotation: degrees(similarityRotation(fit)), probe_x, probe_z };
};

/** Residual statistics of a similarity, n points and 2n − 4 degrees of freedom. */
function statisticsOf(pairs: readonly ControlPair[], mirrored = false) {
  const fit = fitSimilarity(pairs, mirrored)!;
  const residuals = pairs.map((pair) => similarityResidual(fit, pair));
  const squares = residuals.reduce((sum, [x, z]) => sum + x * x + z * z, 0);
  const [Tx, Ty] = similarityForward(fit, 0, 0);
  return { fit, residuals, squares, Tx, Ty };
}

const fourPoints: Runner = (published) => {
  const pairs = setOutOf(published, 'image (col,row)', 'world');
  const { fit, residuals, squares, Tx, Ty } = statisticsOf(pairs);
  return {
    a: fit.re,
    b: fit.im,
    Tx,
    Ty,
    S0: Math.sqrt(squares / (2 * pairs.length - 4)),
    rms_per_point: Math.sqrt(squares / pairs.length),
    max_point_residual: Math.max(...residuals.map(([x, z]) => Math.hypot(x, z))),
  };
};

const largeCoordinates: Runner = (published) => {
  const pairs = places(published, 'xy').map(([x, y], i) => ({
    sheet: [x, -y] as const,
    section: places(published, 'XY')[i]!,
  }));
  const { fit, residuals, squares, Tx, Ty } = statisticsOf(pairs);
  const named = residuals.flatMap(([vX, vY], i) => [
    [`vX${i + 1}`, vX],
    [`vY${i + 1}`, vY],
  ]);
  return {
    a: fit.re,
    b: fit.im,
    Tx,
    Ty,
    scale: similarityScale(fit),
    rotation: (degrees(similarityRotation(fit)) + 360) % 360,
    S0: Math.sqrt(squares / 2),
    ...Object.fromEntries(named),
  };
};

const crossing: Runner = (published) => {
  const [a, b] = ['segment A', 'segment B'].map((name) => places(published, name)) as [Pair[], Pair[]];
  const [x, y] = crossingsOf(polylineOf(a)!, polylineOf(b)!)[0]!.at;
  const along = ([from, to]: Pair[]): Pair => [to![0] - from![0], to![1] - from![1]];
  const between = angleBetween(along(a), along(b));
  const angle = Math.min(between, 180 - between);
  return { x, y, angle, departure_from_90: 90 - angle };
};

const one = (cause: string, amount: number): Contribution[] => [{ cause, source: 'tracing', amount }];

/** Amounts of shared causes by which three inputs are correlated, the lower triangle of Cholesky's factor. */
function correlated([u1, u2, u3]: Pair3, [r12, r13, r23]: Pair3): Contribution[][] {
  const l22 = Math.sqrt(1 - r12 * r12);
  const l32 = (r23 - r12 * r13) / l22;
  return [
    one('1', u1),
    [...one('1', r12 * u2), ...one('2', l22 * u2)],
    [...one('1', r13 * u3), ...one('2', l32 * u3), ...one('3', Math.sqrt(1 - r13 ** 2 - l32 ** 2) * u3)],
  ];
}
type Pair3 = readonly [number, number, number];

const pressureDoubt =
  (r: number): Runner =>
  (published) => {
    const [gammaW, h, z] = ['gamma_w', 'h', 'z'].map((name) => inputOf(published, name)) as [
      number,
      number,
      number,
    ];
    const elevation = weightedSum([
      [r, one('h', 0.05)],
      [Math.sqrt(1 - r * r), one('z', 0.05)],
    ]);
    const doubt = halfWidth(
      weightedSum([
        [gammaW, one('h', 0.1)],
        [-gammaW, elevation],
        [h - z, one('γw', 0.005)],
      ]),
    );
    return { u: gammaW * (h - z), u_c: doubt, U_k2: 2 * doubt };
  };

const seepageDoubt: Runner = (published) => {
  const [k, H, Nf, Nd] = ['k', 'H', 'Nf', 'Nd'].map((name) => inputOf(published, name)) as [
    number,
    number,
    number,
    number,
  ];
  const q = seepagePerRun(k, H, Nf, Nd, 1);
  const doubt = halfWidth(
    weightedSum([
      [q / k, one('k', 1e-6)],
      [q / H, one('H', 0.05)],
      [q / Nf, one('Nf', 0.2)],
      [-q / Nd, one('Nd', 0.5)],
    ]),
  );
  return { q, u_c: doubt, relative: doubt / q };
};

const impedance: Runner = (published) => {
  const [V, I, phi] = ['V', 'I', 'phi'].map((name) => inputOf(published, name)) as [number, number, number];
  const [dV, dI, dPhi] = correlated(
    [0.0032, 9.5e-6, 0.00075],
    [inputOf(published, 'r(V,I)'), inputOf(published, 'r(V,phi)'), inputOf(published, 'r(I,phi)')],
  ) as [Contribution[], Contribution[], Contribution[]];
  const doubt = (byV: number, byI: number, byPhi: number) =>
    halfWidth(
      weightedSum([
        [byV, dV],
        [byI, dI],
        [byPhi, dPhi],
      ]),
    );
  const [c, s] = [Math.cos(phi), Math.sin(phi)];
  return {
    'u(R)': doubt(c / I, (-V * c) / I ** 2, (-V * s) / I),
    'u(X)': doubt(s / I, (-V * s) / I ** 2, (V * c) / I),
    'u(Z)': doubt(1 / I, -V / I ** 2, 0),
  };
};

const untyped = (count: number) =>
  Array.from({ length: count }, (_, i) => ({
    id: `${i}`,
    value: {
      kind: 'line' as const,
      line: 'equipotential' as const,
      name: '',
      points: [],
      finished: true,
      water: null,
      head: null,
      drops: null,
      origin: 'traced' as const,
    },
  }));

const headAfter = (drops: number, lost: number, level: number, count: number) =>
  countDrops(untyped(count - 1) as never, level + lost, level, count).lines[drops - 1]!.head;

const dasPile: Runner = (published) => {
  const [up, down, Nf, Nd, k] = ['upstream', 'downstream', 'Nf', 'Nd', 'k'].map((name) =>
    inputOf(published, name),
  ) as [number, number, number, number, number];
  return {
    rise_a: headAfter(inputOf(published, 'drops to a'), up - down, down, Nd),
    rise_b: headAfter(inputOf(published, 'drops to b'), up - down, down, Nd),
    q: seepagePerRun(k, up - down, Nf, Nd, 1),
  };
};

const counted: Runner = (published) => {
  const [k, H, Nf, Nd] = ['k', 'H', 'Nf', 'Nd'].map((name) => inputOf(published, name)) as [
    number,
    number,
    number,
    number,
  ];
  const q = seepagePerRun(k, H, Nf, Nd, 1);
  return {
    q,
    q_ml: 1000 * flowIn('L/s', q, 'SI'),
    head_after_2_of_12_drops: headAfter(2, H, 0, Nd),
  };
};

/** The cases that are answered by formulas. */
export const CLOSED_FORM_RUNNERS: Readonly<Record<string, Runner>> = {
  '1A-05': (published) => {
    const net = halfSpacePile(inputOf(published, 's'), inputOf(published, 'H'));
    return { exit_gradient: net.headAt(1e-9, -1e-4) / 1e-4 };
  },
  '1A-06': (published) => {
    const net = halfSpacePile(inputOf(published, 's'), inputOf(published, 'H'));
    const at = (depth: number) => net.headAt(1e-12, -depth);
    return { h_over_H_y1: at(1), 'h_over_H_y2.5': at(2.5), h_over_H_y4: at(4) };
  },
  '1A-07': (published) => {
    const net = halfSpacePile(inputOf(published, 's'), 1);
    const place = (i: number, j: number) => net.placeAt(10 - i, j);
    return {
      q_over_kH: seepagePerRun(1, 1, net.channels, net.drops, 1),
      outer_flow_line_half_width: place(0, 4)[0],
      outer_flow_line_depth: -net.placeAt(5, 4)[1],
      node_i3_j2_x: place(3, 2)[0],
      node_i3_j2_depth: -place(3, 2)[1],
    };
  },
  '1A-08': (published) => {
    const width = inputOf(published, 'b');
    const net = flatApronNet({ width, headwater: 1, tailwater: 0, drops: 12, channels: 7, middle: [0, 0] });
    const place = (i: number, j: number) => net.placeAt(12 - i, j);
    return {
      q_over_kH: seepagePerRun(1, 1, net.channels, net.drops, 1),
      outer_flow_line_half_width: place(0, 7)[0],
      outer_flow_line_depth: -place(6, 7)[1],
      node_i4_j3_x: place(4, 3)[0],
      node_i4_j3_depth: -place(4, 3)[1],
    };
  },
  '1A-12': (published) =>
    Object.fromEntries(
      list(published, 'x').map((x) => [
        `h_over_H_x${x}`,
        flatApronHead({ b: inputOf(published, 'b'), H: inputOf(published, 'H') }, x, 0),
      ]),
    ),
  '1A-13': apronUplift,
  '1A-14': (published) => {
    const apron = { b: inputOf(published, 'b'), H: inputOf(published, 'H') };
    return { exit_gradient: flatApronHead(apron, inputOf(published, 'x from centre'), 1e-4) / 1e-4 };
  },
  '1B-08': (published) => {
    const [phi, H, level, z, gammaW] = ['phi', 'H', 'tailwater level', 'z', 'γw'].map((name) =>
      inputOf(published, name),
    ) as [number, number, number, number, number];
    // φ of the head left is 1 − φ of it lost: 57 of 100 drops.
    const head = headAfter(Math.round(100 * (1 - phi)), H, level, 100);
    return { head, u: gammaW * (head - z) };
  },
  '1D-01': tabled('laneRatio', ({ name, from }) => [[name, from]]),
  '1D-03': (published) => {
    const [floor, up, down, H] = ['floor', 'upstream pile', 'downstream pile', 'H'].map((name) =>
      inputOf(published, name),
    ) as [number, number, number, number];
    const creep = creepLength([
      [0, 0],
      [0, -up],
      [0, 0],
      [floor, 0],
      [floor, -down],
      [floor, 0],
    ]);
    return {
      bligh_length: creep.whole,
      bligh_ratio: creepRatio(creep.whole, H)!,
      lane_length: creep.weighted,
      lane_ratio: creepRatio(creep.weighted, H)!,
    };
  },
  '2-01': kozeny,
  '2-02': kozeny,
  '2-16': kozeny,
  '2-03': kozeny,
  '2-04': (published) => {
    const input = (name: string) => inputOf(published, name);
    const { factor, k } = transformed(input('kx'), input('ky'));
    const base =
      input('height') * (input('upstream slope H:V') + input('downstream slope H:V')) + input('crest');
    const water = input('height') - input('freeboard');
    const heel = factor * (base - input('blanket'));
    const edge = heel - factor * water * input('upstream slope H:V');
    const d = correctedEntry(edge, heel);
    const S = focalOrdinate(d, water);
    return {
      x_factor: factor,
      k_equivalent: k,
      d_transformed: d,
      S,
      q: k * basicParabolaSeepage({ S, H: water }),
    };
  },
  '2-05': breakout,
  '2-06': breakout,
  '2-07': (published) => {
    const input = (name: string) => inputOf(published, name);
    const toToe = input('height') / Math.tan(radians(input('alpha')));
    const up = 1 / Math.tan(radians(input('upstream angle')));
    const edge = toToe + input('crest') + (input('height') - input('H')) * up;
    const d = correctedEntry(edge, edge + input('H') * up);
    return { d, a: flatSlopeBreakout(d, input('H'), radians(input('alpha')))! };
  },
  '2-09': (published) =>
    Object.fromEntries(list(published, 'alpha').map((alpha) => [`${alpha}`, breakoutCorrection(alpha)])),
  '3-04': (published) => {
    const [kz, kx, H, Nf, Nd] = ['kz', 'kx', 'H', 'Nf', 'Nd'].map((name) => inputOf(published, name)) as [
      number,
      number,
      number,
      number,
      number,
    ];
    const { k } = transformed(kx, kz, 'ft/day');
    return { q: (seepagePerRun(k, H, Nf, Nd, 1) / METRES_PER_FOOT) * 86_400 };
  },
  '3-05': refraction,
  '3-06': refraction,
  '3-07': refraction,
  '4-01': critical,
  '4-02': critical,
  '4-03': critical,
  '4-10': () => ({ C0: meanOverBase((part) => halfSpacePile(10, 1).headAt(5 * part + 1e-12, -10))! }),
  '4-12': (published) => {
    const [C0, H, D, saturated, gammaW] = ['C0', 'H', 'D', 'gamma_sat', 'gamma_w'].map((name) =>
      inputOf(published, name),
    ) as [number, number, number, number, number];
    const F = heaveFactor(saturated - gammaW, D, C0 * H, gammaW)!;
    return { F, F_unrounded: F };
  },
  '4-13': (published) => ({
    seepage_force: seepageForce(
      inputOf(published, 'head loss') / inputOf(published, 'soil thickness'),
      inputOf(published, 'gamma_w'),
    ),
  }),
  '4-14': (published) => {
    const [i, d, gamma, gammaW] = ['i', 'd', 'gamma', 'gamma_w'].map((name) => inputOf(published, name)) as [
      number,
      number,
      number,
      number,
    ];
    const weight = {
      saturatedUnitWeight: gamma,
      moistUnitWeight: null,
      specificGravity: null,
      voidRatio: null,
    };
    return {
      seepage_force: seepageForce(i, gammaW) * d,
      submerged_weight: criticalGradient(weight, gammaW)! * gammaW * d,
    };
  },
  '4-15': (published) => {
    const input = (name: string) => inputOf(published, name);
    const balance = blowUp(
      input('t'),
      input('gamma'),
      input('ground level'),
      input('head below the cap'),
      input('gamma_w'),
    );
    return {
      u: balance.porePressure,
      F_total: balance.totalFactor!,
      F_effective: balance.effectiveFactor!,
    };
  },
  '4-16': tabled('specificGravity', fromTo(' low', ' high')),
  '4-17': tabled('specificGravity', fromTo(' low', ' high')),
  '4-18': tabled('heave', ({ name, from, to }) => {
    const advice = name.split(', ')[1]!;
    return [
      [`${advice}, from`, from],
      [`${advice}, to`, to],
    ];
  }),
  '4-19': tabled('piping', ({ from }) => [['F', from]]),
  '4-20': tabled('exitGradient', fromTo(', from', ', to')),
  '4-21': tabled('gradientAtToe', ({ name, from }) => [
    [name.includes('factor') ? 'equivalent F for i_c of about 0.8' : 'allowable gradient', from],
  ]),
  '5-10': () => ({
    'gamma_w SI': CUSTOMARY_GAMMA_W.SI,
    'gamma_w US': CUSTOMARY_GAMMA_W.US,
    '62.4 lbf/ft3 in kN/m3': CUSTOMARY_GAMMA_W.US * KN_PER_M3_PER_PCF,
  }),
  '5-11': conversion('m', () => METRES_PER_FOOT),
  '5-14': conversion('N', () => NEWTONS_PER_POUND_FORCE),
  '5-16': conversion('kPa', () => KILOPASCALS_PER_PSF),
  '5-18': conversion('kN/m3', () => KN_PER_M3_PER_PCF),
  '5-19': conversion('m/s', () => permeabilityInMetresPerSecond(1, 'cm/s')),
  '5-20': conversion('m/s', () => permeabilityInMetresPerSecond(1, 'ft/day')),
  '5-21': conversion('m/s', () => permeabilityInMetresPerSecond(1, 'ft/min')),
  '5-22': conversion(
    'cm/s',
    () => permeabilityInMetresPerSecond(1, 'ft/day') / permeabilityInMetresPerSecond(1, 'cm/s'),
  ),
  '5-23': conversion('m3', oneGallon),
  '5-24': conversion('m3/s', () => oneGallon() / 60),
  '5-25': conversion('m3/s', () => 1 / flowIn('gal/day', 1, 'SI')),
  '5-26': conversion('m3/s per m', () => seepagePerMetre(1 / flowIn('gal/day', 1, 'US'), 'US')),
  '5-27': conversion('m3/s per m', () => seepagePerMetre(1 / 86_400, 'US')),
  '5-28': conversion('m3/s', () => flowIn('m³/s', 1, 'US')),
  '5-29': conversion('m/s', () => permeabilityInMetresPerSecond(1, 'm/day')),
  '5-30': conversion('m3/s per m', () => 1 / flowIn('m³/day', 1, 'SI')),
  '5-40': () => ({
    'gal -> m3': oneGallon(),
    'gal/day -> m3/s': 1 / flowIn('gal/day', 1, 'SI'),
    'gal/min -> m3/s': oneGallon() / 60,
    'psf -> Pa': 1000 * KILOPASCALS_PER_PSF,
    'ft/min -> m/s': permeabilityInMetresPerSecond(1, 'ft/min'),
    'ft2 -> m2': seepagePerMetre(1, 'US'),
  }),
  '6-11': (published) => ({
    r_u: pressureRatio(inputOf(published, 'u'), inputOf(published, 'gamma') * inputOf(published, 'z'))!,
  }),
  '7-01': twoPoints,
  '7-02': fourPoints,
  '7-04': largeCoordinates,
  '7-05': (published) => {
    const vertices = places(published, 'vertices');
    return {
      area: signedArea(ringOf(vertices)!),
      area_reversed_order: signedArea(ringOf(vertices.toReversed())!),
    };
  },
  '7-06': crossing,
  '7-08': pressureDoubt(0),
  '7-09': pressureDoubt(0.8),
  '7-10': seepageDoubt,
  '7-11': impedance,
  '8-01': dasPile,
  '8-02': counted,
  '8-05': (published) => {
    const [H, k, length, chart] = ['H', 'k', 'length', 'chart q/kH'].map((name) =>
      inputOf(published, name),
    ) as [number, number, number, number];
    const flow = (shape: number) => {
      const seepage = seepagePerRun(k, H, shape, 1, 1);
      const along = seepageAlong([
        { chainage: 0, seepage },
        { chainage: length, seepage },
      ]);
      return flowIn('m³/day', along!.flow, 'SI');
    };
    return { Q: flow(chart), Q_exact_factor: flow(0.385559017) };
  },
  '8-06': counted,
  '8-07': (published) => {
    const [k, H, Nf, Nd] = ['k', 'H', 'Nf', 'Nd'].map((name) => inputOf(published, name)) as [
      number,
      number,
      number,
      number,
    ];
    const q = seepagePerRun(permeabilityPerSecond(k, 'ft/day', 'US'), H, Nf, Nd, 1);
    return { q_ft3: q * 86_400, q_gal: flowIn('gal/day', q, 'US'), q_si: seepagePerMetre(q, 'US') };
  },
};

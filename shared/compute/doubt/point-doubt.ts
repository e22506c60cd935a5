import {
  type Contribution,
  type Contributions,
  halfWidth,
  sharesOf,
  weightedSum,
} from '#shared/compute/doubt/contributions.ts';
import type { SetOutCause } from '#shared/compute/doubt/place-doubt.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import type { DoubtShares } from '#shared/contract/reading-doubt.ts';

/** A head that a figure hangs on and that is itself read off the drawing or typed. */
export type EndHead = {
  /** `level`: typed, doubtful by the levels; `place`: the elevation of a traced face or drain. */
  readonly from: 'headwater' | 'tailwater' | 'typed' | 'place';
  /** Where the elevation was taken; null for a level. */
  readonly at: SheetPx | null;
};

/** What every reading of one net has in common. */
export type NetDoubt = {
  readonly setOut: readonly SetOutCause[];
  readonly water: EntityOf<'waterLevels'>;
  /** Half-width (95 %) of a traced place, length unit. */
  readonly tracing: number;
  readonly headwater: EndHead;
  readonly outlet: EndHead;
};

/** One reading, as far as its doubt goes. Heads in the length unit, gradient natural. */
export type DoubtfulReading = {
  readonly id: string;
  /** Base-raster pixels. */
  readonly at: SheetPx;
  /** True on a face of free outflow, where the head is the elevation and the pressure nil by definition. */
  readonly onFreeFace: boolean;
  /** True for a place typed in section coordinates. */
  readonly typed: boolean;
  readonly elevationPlusMinus: number | null;
  /** Part of the head lost on the way to the outlet, 0 to 1. */
  readonly partLost: number;
  readonly gradient: readonly [dhdx: number, dhdz: number];
  /** Ids of the neighbouring lines, and the part of the interval passed. */
  readonly between: { readonly before: string; readonly after: string; readonly fraction: number } | null;
  readonly pressureHead: number;
};

/** Contributions to the total head, to the pressure head and to the pore pressure of one reading. */
export type ReadingDoubt = {
  readonly totalHead: Contributions;
  readonly pressureHead: Contributions;
  readonly porePressure: Contributions;
};

/**
 * First-order doubt of one reading at 95 %, cause by cause, after JCGM 100 (2008), 5.1 and 5.2.
 *
 * h = hᵤ − (hᵤ − hₒ)·r with r the part of the head lost: the levels add (1 − r)·U(hᵤ) and r·U(hₒ). A traced line that
 * is off by its half-width moves the head nearby by |∇h|·U, in the ratio of the distances to the two lines. A clicked
 * place carries the error of the set-out in its elevation only, since the lines share it; a typed place has a sure
 * elevation and lies in doubt among the lines. An error of the datum moves head and elevation alike and drops out of
 * h − z. u = γw(h − z) adds (h − z)·U(γw). Heads in the length unit, pressures in γw's unit times it.
 */
export function readingDoubt(reading: DoubtfulReading, net: NetDoubt): ReadingDoubt {
  if (reading.onFreeFace) return onFreeFace(reading, net);
  const levels = endHeads(reading.partLost, net);
  const lines = lineContributions(reading, net);
  const place = reading.typed ? typedPlace(reading, net) : clickedPlace(reading, net);
  const common = weightedSum([
    [1, levels],
    [1, lines],
  ]);
  const pressureHead = weightedSum([
    [1, common],
    [1, place.head],
    [-1, place.elevation],
  ]);
  const { datumPlusMinus, gammaW, gammaWPlusMinus } = net.water;
  return {
    totalHead: weightedSum([
      [1, common],
      [1, place.head],
      [1, given('datum', 'datum', datumPlusMinus)],
    ]),
    pressureHead,
    porePressure: weightedSum([
      [gammaW, pressureHead],
      [reading.pressureHead, given('gammaW', 'gammaW', gammaWPlusMinus)],
    ]),
  };
}

function onFreeFace(reading: DoubtfulReading, net: NetDoubt): ReadingDoubt {
  const place = reading.typed ? typedPlace(reading, net) : clickedPlace(reading, net);
  const datum = given('datum', 'datum', net.water.datumPlusMinus);
  return { totalHead: [...place.elevation, ...datum], pressureHead: [], porePressure: [] };
}

/** Contributions to the head at the outlet. */
export function outletDoubt(net: NetDoubt): Contributions {
  return endHead(net.outlet, net);
}

/** Contributions to the head lost from the headwater to the outlet. */
export function headLostDoubt(net: NetDoubt): Contributions {
  return weightedSum([
    [1, endHead(net.headwater, net)],
    [-1, endHead(net.outlet, net)],
  ]);
}

/** Half-widths and shares of a reading's three figures, for the schedule. */
export function plusMinusOf(doubt: ReadingDoubt): {
  totalHead: number;
  pressureHead: number;
  porePressure: number;
  headShares: DoubtShares;
  pressureShares: DoubtShares;
} {
  return {
    totalHead: halfWidth(doubt.totalHead),
    pressureHead: halfWidth(doubt.pressureHead),
    porePressure: halfWidth(doubt.porePressure),
    headShares: sharesOf(doubt.totalHead),
    pressureShares: sharesOf(doubt.porePressure),
  };
}

function given(cause: string, source: Contribution['source'], halfWide: number | null): Contribution[] {
  return halfWide === null || halfWide === 0 ? [] : [{ cause, source, amount: halfWide }];
}

function endHeads(partLost: number, net: NetDoubt): Contribution[] {
  return weightedSum([
    [1 - partLost, endHead(net.headwater, net)],
    [partLost, endHead(net.outlet, net)],
  ]);
}

function endHead(end: EndHead, { water, setOut, tracing }: NetDoubt): Contribution[] {
  if (end.from === 'headwater') return given('headwater', 'waterLevels', water.headwaterPlusMinus);
  if (end.from === 'tailwater') return given('tailwater', 'waterLevels', water.tailwaterPlusMinus);
  if (end.at === null) return [];
  const at = end.at;
  return [
    ...setOut.map(({ cause, shift }) => ({ cause, source: 'knownPoints' as const, amount: shift(at)[1] })),
    ...given(`outlet ${at[0]} ${at[1]}`, 'tracing', tracing),
  ];
}

/** A line is taken to be off as a whole near the point: tremor along it would average out, a bias does not. */
function lineContributions({ between, gradient }: DoubtfulReading, net: NetDoubt): Contribution[] {
  if (between === null) return [];
  const moved = Math.hypot(gradient[0], gradient[1]) * net.tracing;
  const { before, after, fraction } = between;
  return [
    { cause: `line ${before}`, source: 'tracing', amount: moved * (1 - fraction) },
    { cause: `line ${after}`, source: 'tracing', amount: moved * fraction },
  ];
}

type PlaceDoubt = { head: Contribution[]; elevation: Contribution[] };

/** A click is off by itself along and up; what the set-out is off by, the lines around it share. */
function clickedPlace({ id, at, gradient }: DoubtfulReading, { setOut, tracing }: NetDoubt): PlaceDoubt {
  const along = { cause: `place ${id} along`, source: 'place' as const };
  const up = { cause: `place ${id} up`, source: 'place' as const };
  return {
    head: [
      { ...along, amount: gradient[0] * tracing },
      { ...up, amount: gradient[1] * tracing },
    ],
    elevation: [
      { ...up, amount: tracing },
      ...setOut.map(({ cause, shift }) => ({ cause, source: 'knownPoints' as const, amount: shift(at)[1] })),
    ],
  };
}

function typedPlace(reading: DoubtfulReading, { setOut }: NetDoubt): PlaceDoubt {
  const { id, at, gradient, elevationPlusMinus } = reading;
  const tip = given(`tip ${id}`, 'tip', elevationPlusMinus);
  return {
    head: weightedSum([
      [gradient[1], tip],
      [
        -1,
        setOut.map(({ cause, shift }) => {
          const [offset, elevation] = shift(at);
          return {
            cause,
            source: 'knownPoints' as const,
            amount: gradient[0] * offset + gradient[1] * elevation,
          };
        }),
      ],
    ]),
    elevation: tip,
  };
}

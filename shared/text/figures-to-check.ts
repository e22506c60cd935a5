import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading, PointReading } from '#shared/contract/reading.ts';
import type { ProfileReading } from '#shared/contract/reading-quantities.ts';
import { powerText } from '#shared/text/calculation-sheet/rich-text.ts';
import { titleBlockFigures } from '#shared/text/calculation-sheet/title-block.ts';
import { fixedText, plainText, plusMinusText } from '#shared/text/number-text.ts';
import { DECIMALS, unitNames } from '#shared/text/unit-text.ts';

/** Where a figure stands in the check view. */
export type FigurePart = 'schedule' | 'titleBlock' | 'further';

/** A figure that a reviewer ticks; `key` is the same as long as the reading is. */
export interface FigureToCheck {
  key: string;
  part: FigurePart;
  /** What it is a figure of: a point, the title block, a profile. */
  of: string;
  what: string;
  value: string;
}

type Column = 'offset' | 'elevation' | 'dropsLost' | 'totalHead' | 'pressureHead' | 'porePressure';

export const pointKey = (pointId: string, column: string) => `point ${pointId} ${column}`;
export const cellKey = (cell: string) => `title block ${cell}`;

/**
 * All figures of a frozen reading that can be ticked: the schedule point by point, the title block, and outlets, profiles,
 * exits and stability. What has no figure is not in it.
 */
export function figuresToCheck(document: FlowNetDocument, reading: NetReading): FigureToCheck[] {
  return [
    ...reading.points.flatMap((point) => pointFigures(document, point)),
    ...titleBlockFigures(document, reading).map(({ cell, label, value }) => ({
      key: cellKey(cell),
      part: 'titleBlock' as const,
      of: 'Title block',
      what: label,
      value,
    })),
    ...outletFigures(document, reading),
    ...reading.profiles.flatMap((profile) => profileFigures(document, profile)),
    ...exitFigures(document, reading),
    ...stabilityFigures(document, reading),
  ];
}

function pointFigures({ unitSystem }: FlowNetDocument, point: PointReading): FigureToCheck[] {
  const decimals = DECIMALS[unitSystem];
  const { length, pressure } = unitNames(unitSystem);
  const name = point.name || 'unnamed point';
  const told: Array<[column: Column, label: string, value: string, unit: string]> = [
    ['offset', 'offset', fixedText(point.offset, decimals.offset), length],
    ['elevation', 'elevation', fixedText(point.elevation, decimals.elevation), length],
    ['dropsLost', 'drops lost', fixedText(point.dropsLost, decimals.drops), ''],
    [
      'totalHead',
      'total head',
      plusMinusText(point.totalHead, point.totalHeadPlusMinus, decimals.head),
      length,
    ],
    ['pressureHead', 'pressure head', fixedText(point.pressureHead, decimals.pressureHead), length],
    [
      'porePressure',
      'pore pressure',
      plusMinusText(point.porePressure, point.porePressurePlusMinus, decimals.pressure),
      pressure,
    ],
  ];
  return told
    .filter(([column]) => point[column] !== null)
    .map(([column, label, value, unit]) => ({
      key: pointKey(point.id, column),
      part: 'schedule',
      of: name,
      what: label,
      value: `${value} ${unit}`.trim(),
    }));
}

const further = (key: string, of: string, what: string, value: string): FigureToCheck => ({
  key,
  part: 'further',
  of,
  what,
  value,
});

/** With one outlet its seepage is that of the title block. */
function outletFigures({ unitSystem }: FlowNetDocument, { quantities }: NetReading): FigureToCheck[] {
  const { outlets, seepageFigures } = quantities;
  if (outlets.length < 2) return [];
  return outlets
    .filter(({ seepage }) => seepage !== null)
    .map(({ id, label, seepage }) =>
      further(
        `outlet ${id} seepage`,
        label,
        'seepage',
        `${powerText(seepage, seepageFigures)} ${unitNames(unitSystem).seepage}`,
      ),
    );
}

function profileFigures({ unitSystem }: FlowNetDocument, profile: ProfileReading): FigureToCheck[] {
  const { id, samples, uplift } = profile;
  const name = profile.name || 'Profile';
  const { pressure } = unitNames(unitSystem);
  const read = samples.flatMap(({ porePressure }) => (porePressure === null ? [] : [porePressure]));
  const force = unitSystem === 'SI' ? 'kN per m' : 'lb per ft';
  const along =
    read.length === 0
      ? []
      : [
          further(
            `profile ${id} pressures`,
            name,
            'pressures along it',
            `${read.length} places, greatest ${fixedText(Math.max(...read), DECIMALS[unitSystem].pressure)} ${pressure}`,
          ),
        ];
  const forces = (['total', 'excess'] as const).flatMap((which) => {
    const held = uplift?.[which] ?? null;
    if (held === null) return [];
    const label = which === 'total' ? 'uplift' : 'uplift over the tailwater';
    return [further(`profile ${id} ${which}`, name, label, `${plainText(held.vertical)} ${force}`)];
  });
  return [...along, ...forces];
}

function exitFigures({ unitSystem }: FlowNetDocument, { exits }: NetReading): FigureToCheck[] {
  const { length } = unitNames(unitSystem);
  return exits.flatMap(({ outlet, left, right, offset, cellGradient, factor }) => {
    const key = `exit ${outlet} ${left} ${right}`;
    const name = `Exit at offset ${fixedText(offset, 1)} ${length}`;
    return [
      ...(cellGradient === null ? [] : [further(`${key} i`, name, 'gradient', plainText(cellGradient, 3))]),
      ...(factor === null ? [] : [further(`${key} factor`, name, 'factor', plainText(factor, 3))]),
    ];
  });
}

function stabilityFigures({ unitSystem }: FlowNetDocument, { stability }: NetReading): FigureToCheck[] {
  const { length } = unitNames(unitSystem);
  const heave = stability.heave
    .filter(({ factor }) => factor !== null)
    .map((each) =>
      further(
        `heave ${each.wall} ${each.outlet}`,
        `Heave beside a wall of depth ${fixedText(each.depth, 2)} ${length}`,
        'factor',
        plainText(each.factor, 3),
      ),
    );
  const ratio = stability.creep?.weightedRatio ?? null;
  return ratio === null
    ? heave
    : [...heave, further('creep', 'Creep', 'weighted ratio', plainText(ratio, 3))];
}

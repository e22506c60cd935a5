import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading, PointReading } from '#shared/contract/reading.ts';
import { fixedText, plainText, plusMinusText, signedText } from '#shared/text/number-text.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { SheetBlock, SheetChapter, SheetFact, SheetSource } from './content.ts';
import { powerText } from './rich-text.ts';
import { seepageText } from './title-block.ts';

/** The schedule of points, what was measured beside it, and the quantities of the net as a whole. */
export function resultsChapter({ document, reading }: SheetSource): SheetChapter {
  return {
    id: 'results',
    title: 'Results',
    blocks: [
      { kind: 'facts', rows: quantityFacts(document, reading) },
      ...outletTable(document, reading),
      scheduleTable(document, reading),
      ...remarks(reading),
      ...measuredTable(document, reading),
    ],
  };
}

function quantityFacts(document: FlowNetDocument, reading: NetReading): SheetFact[] {
  const { quantities, doubt } = reading;
  const { length, unitWeight } = unitNames(document.unitSystem);
  const within =
    doubt.seepageFactor === null ? '' : `, within ×/÷ ${plainText(doubt.seepageFactor, 3)} (95 %)`;
  return [
    { label: 'Head lost H', value: `${plusMinusText(quantities.headLost, doubt.headLost, 2)} ${length}` },
    { label: 'Drops Nd', value: plainText(quantities.drops) },
    { label: 'Channels Nf', value: plainText(quantities.channels) },
    { label: 'Shape factor Nf/Nd', value: plainText(quantities.shapeFactor) },
    {
      label: 'Head per drop Δh',
      value: `${plusMinusText(quantities.headPerDrop, doubt.headPerDrop, 3)} ${length}`,
    },
    { label: 'Unit weight of water γw', value: `${plainText(quantities.gammaW)} ${unitWeight}` },
    { label: 'Seepage q', value: `${seepageText(document, reading)}${within}` },
  ];
}

function outletTable(document: FlowNetDocument, { quantities }: NetReading): SheetBlock[] {
  if (quantities.outlets.length < 2) return [];
  const { length, seepage } = unitNames(document.unitSystem);
  return [
    {
      kind: 'table',
      caption: 'Outlets',
      columns: [
        { label: 'Outlet', align: 'left', weight: 3 },
        { label: `Head, ${elevationUnit(document.unitSystem, document.datum)}`, align: 'right', weight: 2 },
        { label: `Head lost, ${length}`, align: 'right', weight: 2 },
        { label: 'Drops', align: 'right', weight: 1 },
        { label: 'Channels', align: 'right', weight: 1 },
        { label: `Seepage, ${seepage}`, align: 'right', weight: 2 },
      ],
      rows: quantities.outlets.map((outlet) => [
        outlet.label,
        fixedText(outlet.head, 2),
        fixedText(outlet.headLost, 2),
        plainText(outlet.drops),
        plainText(outlet.channels),
        powerText(outlet.seepage, quantities.seepageFigures),
      ]),
    },
  ];
}

function scheduleTable(document: FlowNetDocument, reading: NetReading): SheetBlock {
  const { length, pressure } = unitNames(document.unitSystem);
  const elevation = elevationUnit(document.unitSystem, document.datum);
  return {
    kind: 'table',
    caption: 'Schedule of points. ± hold 95 %.',
    columns: [
      { label: 'Point', align: 'left', weight: 1.6 },
      { label: `Offset, ${length}`, align: 'right', weight: 1.3 },
      { label: `Elevation z, ${elevation}`, align: 'right', weight: 1.5 },
      { label: 'Drops lost', align: 'right', weight: 1 },
      { label: `Total head h, ${elevation}`, align: 'right', weight: 2.1 },
      { label: `Pressure head, ${length}`, align: 'right', weight: 1.9 },
      { label: `Pore pressure u, ${pressure}`, align: 'right', weight: 2 },
    ],
    rows: reading.points.map((point) => pointRow(document, point)),
  };
}

function pointRow({ unitSystem }: FlowNetDocument, point: PointReading): string[] {
  const decimals = DECIMALS[unitSystem];
  return [
    point.name,
    fixedText(point.offset, decimals.offset),
    fixedText(point.elevation, decimals.elevation),
    fixedText(point.dropsLost, decimals.drops),
    plusMinusText(point.totalHead, point.totalHeadPlusMinus, decimals.head),
    plusMinusText(point.pressureHead, point.pressureHeadPlusMinus, decimals.pressureHead),
    plusMinusText(point.porePressure, point.porePressurePlusMinus, decimals.pressure),
  ];
}

/** Why a point has no figure, and what is questioned about those that have one. */
function remarks({ points }: NetReading): SheetBlock[] {
  const items = points.flatMap((point) => {
    const texts = [point.reason?.text, ...point.findings.map((found) => found.text)].filter(Boolean);
    return texts.length === 0 ? [] : [`${point.name}: ${texts.join(' ')}`];
  });
  return items.length === 0 ? [] : [{ kind: 'list', items }];
}

function measuredTable(document: FlowNetDocument, { measured, points }: NetReading): SheetBlock[] {
  if (measured.length === 0) return [];
  const { length } = unitNames(document.unitSystem);
  const names = new Map(points.map((point) => [point.id, point.name]));
  return [
    {
      kind: 'table',
      caption: 'Measured beside the net. Measured minus net: positive is adverse.',
      columns: [
        { label: 'Point', align: 'left', weight: 2 },
        {
          label: `Head measured, ${elevationUnit(document.unitSystem, document.datum)}`,
          align: 'right',
          weight: 2,
        },
        { label: `Measured − net, ${length}`, align: 'right', weight: 2 },
        { label: `± of it at 95 %, ${length}`, align: 'right', weight: 2 },
        { label: 'Remark', align: 'left', weight: 3 },
      ],
      rows: measured.map((each) => [
        names.get(each.id) ?? '',
        plusMinusText(each.head, each.headPlusMinus, 2),
        signedText(each.difference, 2),
        fixedText(each.differencePlusMinus, 2),
        each.wetAboveNet ? 'wet where the net has no pressure' : each.beyond ? 'beyond its ±' : '',
      ]),
    },
  ];
}

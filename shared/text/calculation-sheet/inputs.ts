import { type EntityOf, entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { fixedText, plainText, signedText } from '#shared/text/number-text.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { SheetBlock, SheetChapter, SheetFact, SheetSource } from './content.ts';
import { powerText } from './rich-text.ts';
import { drawingText, figuresOf, levelText } from './title-block.ts';
import { LINE_NAMES, NOT_STATED, orNotStated } from './words.ts';

/** Everything that was put in, with where it comes from. */
export function inputsChapter(source: SheetSource): SheetChapter {
  const { document, reading, drawing, pageNumber } = source;
  return {
    id: 'inputs',
    title: 'Inputs and their sources',
    blocks: [
      {
        kind: 'facts',
        rows: [
          { label: 'Drawing', value: `${drawingText(drawing)}, page ${pageNumber}` },
          { label: 'File, SHA-256', value: drawing.sha256 },
          ...levelFacts(document),
          ...countFacts(document),
        ],
      },
      soilTable(document),
      knownPointTable(document, reading),
      { kind: 'facts', rows: setOutFacts(document, reading) },
      lineTable(document, reading),
    ],
  };
}

const withDoubt = (plusMinus: number | null) => (plusMinus === null ? '' : ` ± ${plainText(plusMinus)}`);

function levelFacts(document: FlowNetDocument): SheetFact[] {
  const levels = singleOf(document, 'waterLevels')?.value;
  if (!levels) return [];
  const { unitWeight, length } = unitNames(document.unitSystem);
  return [
    {
      label: 'Headwater',
      value: levelText(document, levels.headwater) + withDoubt(levels.headwaterPlusMinus),
    },
    {
      label: 'Tailwater',
      value:
        levels.tailwater === null
          ? 'none'
          : levelText(document, levels.tailwater) + withDoubt(levels.tailwaterPlusMinus),
    },
    {
      label: 'Unit weight of water',
      value: `${plainText(levels.gammaW)}${withDoubt(levels.gammaWPlusMinus)} ${unitWeight}`,
    },
    {
      label: 'Datum ±',
      value: levels.datumPlusMinus === null ? NOT_STATED : `${plainText(levels.datumPlusMinus)} ${length}`,
    },
    { label: 'Source of the levels and the drains’ state', value: orNotStated(levels.source) },
  ];
}

function countFacts(document: FlowNetDocument): SheetFact[] {
  const count = singleOf(document, 'netCount')?.value;
  if (!count) return [];
  return [
    { label: 'Drops Nd as stated', value: count.drops === null ? NOT_STATED : plainText(count.drops) },
    {
      label: 'Channels Nf as stated',
      value: count.channels === null ? 'counted from the traced flow lines' : plainText(count.channels),
    },
    { label: 'Cells B/L', value: plainText(count.cellRatio) },
    {
      label: 'Accuracy on the scan',
      value: `tracing ${plainText(count.tracingAccuracyPx)} px, known points ${plainText(count.knownPointAccuracyPx)} px`,
    },
  ];
}

type Soil = Omit<EntityOf<'permeability'>, 'kind'>;

function soilTable(document: FlowNetDocument): SheetBlock {
  const single = singleOf(document, 'permeability');
  const soils: Array<[string, Soil]> = [
    ...(single ? [['Soil of the section', single.value] as [string, Soil]] : []),
    ...entitiesOf(document, 'soil').map(({ value }): [string, Soil] => [value.name || 'soil', value]),
  ];
  const weight = unitNames(document.unitSystem).unitWeight;
  return {
    kind: 'table',
    caption: 'Soils',
    columns: [
      { label: 'Soil', align: 'left', weight: 1.6 },
      { label: 'kh', align: 'right', weight: 1.7 },
      { label: 'kv', align: 'right', weight: 1.7 },
      { label: 'Dip, °', align: 'right', weight: 0.7 },
      { label: 'Within ×/÷', align: 'right', weight: 0.9 },
      { label: `Saturated, ${weight}`, align: 'right', weight: 1.2 },
      { label: `Moist, ${weight}`, align: 'right', weight: 1.2 },
      { label: 'Gs', align: 'right', weight: 0.7 },
      { label: 'e', align: 'right', weight: 0.7 },
      { label: 'Source', align: 'left', weight: 2.6 },
    ],
    rows: soils.map(([name, soil]) => [
      name,
      permeabilityCell(soil.k, soil.unit),
      soil.kv === null ? 'as kh' : permeabilityCell(soil.kv, soil.unit),
      plainText(soil.dipDeg),
      plainText(soil.factor),
      plainText(soil.saturatedUnitWeight),
      plainText(soil.moistUnitWeight),
      plainText(soil.specificGravity),
      plainText(soil.voidRatio),
      orNotStated(soil.source),
    ]),
  };
}

const permeabilityCell = (k: number | null, unit: string) =>
  k === null ? NOT_STATED : `${powerText(k, figuresOf(k))} ${unit}`;

function knownPointTable(document: FlowNetDocument, reading: NetReading): SheetBlock {
  const { length } = unitNames(document.unitSystem);
  const residuals = new Map(reading.setOut.residuals.map((each) => [each.id, each]));
  return {
    kind: 'table',
    caption: 'Known points',
    columns: [
      { label: 'Point', align: 'left', weight: 2 },
      { label: `Offset, ${length}`, align: 'right', weight: 2 },
      {
        label: `Elevation, ${elevationUnit(document.unitSystem, document.datum)}`,
        align: 'right',
        weight: 2,
      },
      { label: 'Used for', align: 'left', weight: 1.4 },
      { label: `Residual of offset, ${length}`, align: 'right', weight: 2 },
      { label: `Residual of elevation, ${length}`, align: 'right', weight: 2 },
    ],
    rows: entitiesOf(document, 'knownPoint').map(({ id, value }) => [
      value.name,
      fixedText(value.offset, 3),
      fixedText(value.elevation, 3),
      value.use === 'fit' ? 'the fit' : 'a check',
      signedText(residuals.get(id)?.offset ?? null, 3),
      signedText(residuals.get(id)?.elevation ?? null, 3),
    ]),
  };
}

function setOutFacts(document: FlowNetDocument, { setOut }: NetReading): SheetFact[] {
  const stated = singleOf(document, 'setOut')?.value;
  const scales = {
    equal: 'one scale',
    plottingExaggeration: 'drawn with exaggeration, which is taken out',
    transformedSection: 'drawn as a transformed section',
    stretchedPaper: 'one scale, the paper’s stretch taken out',
    perspective: 'one scale, the perspective of the photograph taken out',
  } as const;
  return [
    {
      label: 'Scale as stated',
      value: stated?.statedScale ? `1:${plainText(stated.statedScale, 6)}` : NOT_STATED,
    },
    { label: 'Scales of the drawing', value: stated ? scales[stated.scales] : NOT_STATED },
    { label: 'Exaggeration', value: plainText(setOut.exaggeration) },
    { label: 'Turned on the sheet', value: `${fixedText(setOut.rotationDeg, 2)}°` },
  ];
}

/** Lines that carry a head, and how each got it. */
function lineTable(document: FlowNetDocument, reading: NetReading): SheetBlock {
  const lines = new Map(entitiesOf(document, 'line').map(({ id, value }) => [id, value]));
  const sources = {
    boundary: 'boundary',
    counted: 'by count',
    typedDrops: 'drops typed',
    typedHead: 'head typed',
    unordered: 'not ordered',
  } as const;
  return {
    kind: 'table',
    caption: 'Lines of known head',
    columns: [
      { label: 'Line', align: 'left', weight: 3 },
      { label: 'Drops lost', align: 'right', weight: 1 },
      { label: `Head, ${elevationUnit(document.unitSystem, document.datum)}`, align: 'right', weight: 2 },
      { label: 'How', align: 'left', weight: 2 },
    ],
    rows: reading.lines.map((line) => {
      const traced = lines.get(line.id);
      const kind = traced ? LINE_NAMES[traced.line] : 'line';
      const adopted = traced?.origin === 'adopted' ? ', adopted' : '';
      return [
        `${traced?.name ? `${traced.name} (${kind})` : kind}${adopted}`,
        plainText(line.drops),
        fixedText(line.head, 2),
        sources[line.source],
      ];
    }),
  };
}

import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { ProfileReading, ProfileSample } from '#shared/contract/reading-quantities.ts';
import { fixedText, plainText } from '#shared/text/number-text.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { SheetBlock, SheetChapter, SheetFact, SheetSource } from './content.ts';

const USES: Record<ProfileReading['use'], string> = {
  base: 'base',
  slipSurface: 'slip surface',
  filterBoundary: 'filter boundary',
  borehole: 'borehole',
  other: 'profile',
};
/** Samples printed of one profile; the others are in the exported tables. */
const SAMPLES_SHOWN = 60;

/** The profiles with their pressures, and the uplift on bases. Null without profiles. */
export function profilesChapter({ document, reading }: SheetSource): SheetChapter | null {
  if (reading.profiles.length === 0) return null;
  return {
    id: 'profiles',
    title: 'Profiles and uplift',
    blocks: reading.profiles.flatMap((profile) => profileBlocks(document, profile)),
  };
}

function profileBlocks(document: FlowNetDocument, profile: ProfileReading): SheetBlock[] {
  const name = `${profile.name || 'Profile'} (${USES[profile.use]})`;
  const { length, pressure } = unitNames(document.unitSystem);
  const along = profile.samples.flatMap((sample) =>
    sample.distance === null ? [] : [[sample.distance, sample.porePressure] as const],
  );
  const diagram: SheetBlock = {
    kind: 'diagram',
    diagram: {
      caption: `${name}: pore pressure along it`,
      across: `distance, ${length}`,
      up: `u, ${pressure}`,
      points: along,
    },
  };
  return [
    ...(along.length < 2 ? [] : [diagram]),
    ...upliftBlocks(document, profile),
    sampleTable(document, name, profile.samples.slice(0, SAMPLES_SHOWN)),
    ...sampleRemarks(profile),
  ];
}

function upliftBlocks({ unitSystem }: FlowNetDocument, { uplift }: ProfileReading): SheetBlock[] {
  if (uplift === null) return [];
  const force = unitSystem === 'SI' ? 'kN per m' : 'lb per ft';
  const { length } = unitNames(unitSystem);
  const fact = (label: string, held: typeof uplift.total): SheetFact[] =>
    held === null
      ? []
      : [
          {
            label,
            value: `${plainText(held.vertical)} ${force} upwards, ${plainText(held.horizontal)} ${force} towards growing offsets; acts ${fixedText(held.arm, 2)} ${length} from the first end`,
          },
        ];
  const rows = [
    ...fact('Uplift, tailwater included', uplift.total),
    ...fact('Excess over the tailwater', uplift.excess),
  ];
  return [
    ...(rows.length === 0 ? [] : [{ kind: 'facts', rows } as const]),
    ...(uplift.note === '' ? [] : [{ kind: 'paragraph', text: uplift.note } as const]),
  ];
}

function sampleTable(
  document: FlowNetDocument,
  caption: string,
  samples: readonly ProfileSample[],
): SheetBlock {
  const { length, pressure } = unitNames(document.unitSystem);
  const elevation = elevationUnit(document.unitSystem, document.datum);
  const decimals = DECIMALS[document.unitSystem];
  return {
    kind: 'table',
    caption,
    columns: [
      { label: `Distance, ${length}`, align: 'right', weight: 1.2 },
      { label: `Offset, ${length}`, align: 'right', weight: 1.2 },
      { label: `Elevation, ${elevation}`, align: 'right', weight: 1.4 },
      { label: `Total head, ${elevation}`, align: 'right', weight: 1.4 },
      { label: `Pressure head, ${length}`, align: 'right', weight: 1.4 },
      { label: `u, ${pressure}`, align: 'right', weight: 1.2 },
      { label: 'ru', align: 'right', weight: 0.8 },
    ],
    rows: samples.map((sample) => [
      fixedText(sample.distance, 2),
      fixedText(sample.offset, decimals.offset),
      fixedText(sample.elevation, decimals.elevation),
      fixedText(sample.totalHead, decimals.head),
      fixedText(sample.pressureHead, decimals.pressureHead),
      fixedText(sample.porePressure, decimals.pressure),
      fixedText(sample.ru, 2),
    ]),
  };
}

/** Each reason once, with how many samples it is about; and how many samples are not printed. */
function sampleRemarks({ samples, remark }: ProfileReading): SheetBlock[] {
  const counts = new Map<string, number>();
  for (const sample of samples)
    for (const said of [sample.reason, sample.doubtful])
      if (said) counts.set(said.text, (counts.get(said.text) ?? 0) + 1);
  const unprinted = samples.length - SAMPLES_SHOWN;
  const items = [
    ...(remark ? [remark.text] : []),
    ...[...counts].map(([text, count]) => `${count} of ${samples.length} places: ${text}`),
    ...(unprinted > 0 ? [`${unprinted} more places are in the exported table.`] : []),
  ];
  return items.length === 0 ? [] : [{ kind: 'list', items }];
}

/** Exits, heave and creep. Null when the reading holds none. */
export function exitsChapter({ document, reading }: SheetSource): SheetChapter | null {
  const blocks = [
    ...exitTable(document, reading),
    ...heaveTable(document, reading),
    ...creepFacts(document, reading),
  ];
  return blocks.length === 0 ? null : { id: 'exits', title: 'Exits and stability', blocks };
}

function exitTable(document: FlowNetDocument, { exits }: NetReading): SheetBlock[] {
  if (exits.length === 0) return [];
  const { length } = unitNames(document.unitSystem);
  return [
    {
      kind: 'table',
      caption: 'Cells at which the water leaves. Gradients are positive upwards.',
      columns: [
        { label: `Offset, ${length}`, align: 'right', weight: 1 },
        {
          label: `Elevation, ${elevationUnit(document.unitSystem, document.datum)}`,
          align: 'right',
          weight: 1.2,
        },
        { label: 'i of the cell', align: 'right', weight: 1 },
        { label: 'i at the place', align: 'right', weight: 1 },
        { label: 'Critical i', align: 'right', weight: 1 },
        { label: 'Factor', align: 'right', weight: 0.8 },
        { label: 'Remark', align: 'left', weight: 3 },
      ],
      rows: exits.map((exit) => [
        fixedText(exit.offset, 1),
        fixedText(exit.elevation, 2),
        plainText(exit.cellGradient, 3),
        exit.pointState === 'singular' ? 'no bound' : plainText(exit.pointGradient, 3),
        plainText(exit.criticalGradient, 3),
        plainText(exit.factor, 3),
        exit.factorNote,
      ]),
    },
  ];
}

function heaveTable(document: FlowNetDocument, { stability }: NetReading): SheetBlock[] {
  if (stability.heave.length === 0) return [];
  const { length } = unitNames(document.unitSystem);
  return [
    {
      kind: 'table',
      caption: 'Heave of the prism beside a wall',
      columns: [
        { label: `Depth, ${length}`, align: 'right', weight: 1 },
        { label: `Width, ${length}`, align: 'right', weight: 1 },
        { label: `Mean excess head, ${length}`, align: 'right', weight: 1.5 },
        { label: 'Factor', align: 'right', weight: 1 },
        { label: 'Remark', align: 'left', weight: 3 },
      ],
      rows: stability.heave.map((heave) => [
        fixedText(heave.depth, 2),
        fixedText(heave.width, 2),
        fixedText(heave.meanExcessHead, 2),
        plainText(heave.factor, 3),
        heave.note,
      ]),
    },
  ];
}

function creepFacts({ unitSystem }: FlowNetDocument, { stability }: NetReading): SheetBlock[] {
  const { creep } = stability;
  if (creep === null) return [];
  const { length } = unitNames(unitSystem);
  return [
    {
      kind: 'facts',
      rows: [
        {
          label: 'Creep, a rough cross-check',
          value: `weighted length ${fixedText(creep.weightedLength, 2)} ${length} (steep ${fixedText(creep.steep, 2)}, flat ${fixedText(creep.flat, 2)}), ratio ${plainText(creep.weightedRatio, 3)} (Lane 1935)`,
        },
      ],
    },
  ];
}

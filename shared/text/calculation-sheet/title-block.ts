import { type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { NetReading, TitleBlockCell } from '#shared/contract/reading.ts';
import { DECISION_WORDS } from '#shared/text/decision-words.ts';
import { fixedText, NO_FIGURE, plainText } from '#shared/text/number-text.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { SheetFact, SheetSource, SheetStatus } from './content.ts';
import { outletStates } from './outlets.ts';
import { powerText } from './rich-text.ts';
import { momentText, NOT_STATED, orNotStated } from './words.ts';

/** The cells of the title block in the order in which the desk shows them, with the job number. */
export function titleBlock(source: SheetSource): SheetFact[] {
  const { document, reading, dam, section, drawing, netName, jobNumber, status } = source;
  return [
    { label: 'Section', value: `${sectionLabel(section)}, ${netName}` },
    { label: 'Dam', value: dam.name },
    { label: 'Drawing', value: drawingText(drawing) },
    { label: 'Job number', value: orNotStated(jobNumber) },
    ...titleBlockFigures(document, reading).map(({ label, value }) => ({ label, value })),
    { label: 'Net check', value: reading.netCheck?.summary.text ?? NO_FIGURE },
    { label: 'Drawn', value: source.drawnBy.join(', ') || NOT_STATED },
    { label: 'Checked', value: checkedText(status) },
    {
      label: 'Calculation',
      value: status.kind === 'draft' ? `DRAFT of ${momentText(status.at)}` : `Revision ${status.label}`,
    },
  ];
}

/** The cells that hold figures of the net, each by the name of its cell on the desk. */
export function titleBlockFigures(
  document: FlowNetDocument,
  reading: NetReading,
): Array<SheetFact & { cell: TitleBlockCell }> {
  const headwater = singleOf(document, 'waterLevels')?.value.headwater ?? null;
  const { quantities } = reading;
  return [
    { cell: 'scale', label: 'Scale', value: scaleText(document, reading) },
    { cell: 'residual', label: 'Residual', value: residualText(document, reading) },
    { cell: 'headwater', label: 'Headwater', value: levelText(document, headwater) },
    {
      cell: 'outlet',
      label: 'Outlet',
      value: outletStates(document, reading).join('; ') || NOT_STATED,
    },
    { cell: 'drops', label: 'Drops Nd', value: plainText(quantities.drops) },
    { cell: 'channels', label: channelsLabel(reading), value: plainText(quantities.channels) },
    { cell: 'headPerDrop', label: 'Head per drop', value: headPerDropText(document, reading) },
    { cell: 'permeability', label: 'Permeability', value: permeabilityText(document) },
    { cell: 'seepage', label: 'Seepage', value: seepageText(document, reading) },
  ];
}

export function drawingText({ number, title, revision }: SheetSource['drawing']): string {
  return [number, revision && `rev ${revision}`, title].filter(Boolean).join(', ') || 'without a number';
}

/** A level with unit and datum; says so when there is none. */
export function levelText(document: FlowNetDocument, level: number | null): string {
  if (level === null) return NOT_STATED;
  return `${fixedText(level, DECIMALS[document.unitSystem].elevation)} ${elevationUnit(document.unitSystem, document.datum)}`;
}

/** Permeability with its unit and the factor within which it is known. */
export function permeabilityText(document: FlowNetDocument): string {
  const held = singleOf(document, 'permeability')?.value;
  if (!held || held.k === null) return NOT_STATED;
  const factor = held.factor === null ? '' : `, within ×/÷ ${plainText(held.factor)}`;
  return `${powerText(held.k, figuresOf(held.k))} ${held.unit}${factor}`;
}

/** Significant figures with which a number was entered, two at least. */
export function figuresOf(value: number): number {
  const digits = value.toExponential().split('e')[0]?.replace(/[-.]/g, '') ?? '';
  return Math.max(2, digits.length);
}

/** Seepage with its unit; names the traced channels where the outermost line is no boundary. */
export function seepageText(document: FlowNetDocument, { quantities }: NetReading): string {
  if (quantities.seepage === null) return NO_FIGURE;
  const only = quantities.channelsComplete ? '' : ', traced channels only';
  return `${powerText(quantities.seepage, quantities.seepageFigures)} ${unitNames(document.unitSystem).seepage}${only}`;
}

const channelsLabel = ({ quantities }: NetReading) =>
  quantities.channelsComplete ? 'Channels Nf' : 'Traced channels';

function scaleText({ unitSystem }: FlowNetDocument, { setOut }: NetReading): string {
  if (setOut.unitsPerPx === null) return 'not set out';
  const scan = `${plainText(setOut.unitsPerPx, 4)} ${unitNames(unitSystem).length} per pixel`;
  return setOut.impliedScale === null
    ? scan
    : `${scan}, drawing about 1:${plainText(setOut.impliedScale, 3)}`;
}

function residualText({ unitSystem }: FlowNetDocument, { setOut }: NetReading): string {
  if (setOut.state !== 'fitted') return 'not set out';
  const unit = unitNames(unitSystem).length;
  const residual =
    setOut.residual === null
      ? 'none: no more points than the fit needs'
      : `${fixedText(setOut.residual, 3)} ${unit}`;
  return `${residual}${placeDoubtText(setOut.placeDoubt, unit)}`;
}

/** What the known points leave to a place, as on the desk: both coordinates in one length. Old readings tell none. */
function placeDoubtText(placeDoubt: NetReading['setOut']['placeDoubt'], unit: string): string {
  if (placeDoubt === null) return '';
  const [middle, corner] = [placeDoubt.middle, placeDoubt.corner].map(({ offset, elevation }) =>
    plainText(Math.hypot(offset, elevation), 2),
  );
  return `; places ± ${middle}${middle === corner ? '' : ` to ${corner}`} ${unit}`;
}

function headPerDropText({ unitSystem }: FlowNetDocument, { quantities }: NetReading): string {
  if (quantities.unequalIntervals) return 'unequal intervals';
  if (quantities.headPerDrop === null) return NO_FIGURE;
  return `${fixedText(quantities.headPerDrop, 2)} ${unitNames(unitSystem).length}`;
}

function checkedText(status: SheetStatus): string {
  if (status.kind === 'draft') return 'not sent for checking';
  if (status.decision === null) return `waiting for ${status.reviewer}`;
  return `${DECISION_WORDS[status.decision.decision].state} by ${status.decision.by}, ${momentText(status.decision.at)}`;
}

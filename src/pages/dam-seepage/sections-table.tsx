import { Fragment, type ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { SelectField } from '#client/components/field.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { fixedText, NO_FIGURE } from '#client/lib/figures.ts';
import { paths } from '#client/lib/paths.ts';
import { damSeepageText as text } from '#client/text/dam-seepage.ts';
import type { FlowUnit } from '#shared/compute/quantities/seepage-volume.ts';
import { metresPerLengthUnit } from '#shared/compute/units.ts';
import type { ChosenNet, DamSeepageDto } from '#shared/contract/dam-seepage.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import { FlowFigure } from './flow-figure.tsx';
import { type SectionRow, sectionRows } from './section-rows.ts';

interface SectionsTableProps {
  found: DamSeepageDto;
  netIds: readonly string[];
  unit: FlowUnit;
  /** Figures of another choice than the one shown are kept back. */
  isWorkingOut: boolean;
  onChoose: (row: SectionRow, netId: string | null) => void;
}

/** The sections of a dam with the net that stands for each, and what it says. */
export function SectionsTable({ found, netIds, unit, isWorkingOut, onChoose }: SectionsTableProps) {
  const level = elevationUnit(found.unitSystem, found.datum);
  const heads = {
    chainage: text.chainage(unitNames(found.unitSystem).length),
    headwater: text.headwater(level),
    tailwater: text.tailwater(level),
    flow: found.unitSystem === 'SI' ? text.perMetre(unit) : text.perFoot(unit),
  };
  return (
    <Table caption={text.sections} stacked>
      <thead>
        <tr>
          <HeadCell>{text.section}</HeadCell>
          <HeadCell numeric>{heads.chainage}</HeadCell>
          <HeadCell>{text.net}</HeadCell>
          <HeadCell numeric>{heads.headwater}</HeadCell>
          <HeadCell numeric>{heads.tailwater}</HeadCell>
          <HeadCell numeric>{heads.flow}</HeadCell>
          <HeadCell numeric>{text.factor}</HeadCell>
        </tr>
      </thead>
      <tbody>
        {sectionRows(found, netIds).map((row) => (
          <Fragment key={row.id}>
            <tr>
              <Cell className="whitespace-nowrap">
                <SectionName row={row} />
              </Cell>
              <Figure head={heads.chainage}>{row.chainage || text.noChainage}</Figure>
              <Cell className="min-w-44">
                <NetPicker row={row} onChoose={(netId) => onChoose(row, netId)} />
              </Cell>
              <NetFigures row={row} found={found} unit={unit} heads={heads} isWorkingOut={isWorkingOut} />
            </tr>
            {isWorkingOut ? null : <RemarkRow chosen={row.chosen} />}
          </Fragment>
        ))}
      </tbody>
    </Table>
  );
}

function SectionName({ row: { name, drawing } }: { row: SectionRow }) {
  return (
    <>
      <span className="font-semibold">{sectionTitle(name)}</span>
      {drawing === null ? null : (
        <Link to={paths.drawing(drawing.id)} className="ml-2 text-sm">
          {drawing.title}
        </Link>
      )}
    </>
  );
}

function NetPicker({ row, onChoose }: { row: SectionRow; onChoose: (netId: string | null) => void }) {
  if (row.nets.length === 0) return <span className="text-ink-2">{text.noneToChoose}</span>;
  return (
    <SelectField
      label={text.netOf(sectionTitle(row.name))}
      labelHidden
      value={row.netId ?? ''}
      onChange={(event) => onChoose(event.target.value || null)}
    >
      <option value="">{text.noNet}</option>
      {row.nets.map(({ id, name, putAway }) => (
        <option key={id} value={id}>
          {putAway ? text.putAway(name) : name}
        </option>
      ))}
    </SelectField>
  );
}

/** Headwater, tailwater, seepage and factor. */
const FIGURE_COLUMNS = 4;
const COLUMNS = 3 + FIGURE_COLUMNS;

interface NetFiguresProps {
  row: SectionRow;
  found: DamSeepageDto;
  unit: FlowUnit;
  heads: { headwater: string; tailwater: string; flow: string };
  isWorkingOut: boolean;
}

function NetFigures({ row: { netId, chosen }, found, unit, heads, isWorkingOut }: NetFiguresProps) {
  if (netId === null) return <Cell colSpan={FIGURE_COLUMNS} className="max-sm:hidden" />;
  if (isWorkingOut || chosen === null)
    return (
      <Cell colSpan={FIGURE_COLUMNS} className="text-ink-2">
        {text.workingOut}
      </Cell>
    );
  const metres = metresPerLengthUnit(found.unitSystem);
  const { headwater, tailwater, seepage, factor, figures } = chosen;
  const level = (value: number | null) => fixedText(value === null ? null : value / metres, 2);
  return (
    <>
      <Figure head={heads.headwater}>{level(headwater)}</Figure>
      <Figure head={heads.tailwater}>{level(tailwater)}</Figure>
      <Figure head={heads.flow}>
        {seepage === null ? NO_FIGURE : <FlowFigure flow={seepage * metres} figures={figures} unit={unit} />}
      </Figure>
      <Figure head={text.factor}>{fixedText(factor, 1)}</Figure>
    </>
  );
}

/** Why the net above is no part of the total, or only a part of its flow; nothing when it is all in. */
function RemarkRow({ chosen }: { chosen: ChosenNet | null }) {
  if (chosen === null || (chosen.leftOut === null && !chosen.tracedOnly)) return null;
  return (
    <tr>
      <Cell colSpan={COLUMNS} className="bg-doubt text-sm text-attention">
        {chosen.leftOut ? text.leftOut(chosen.leftOut.text) : text.tracedOnly}{' '}
        <Link to={paths.net(chosen.netId)}>{text.openNet}</Link>
      </Cell>
    </tr>
  );
}

/** A figure under its head; on a narrow screen, where the rows are stacked, beside it. */
function Figure({ head, children }: { head: string; children: ReactNode }) {
  return (
    <Cell numeric className="whitespace-nowrap">
      <span className="text-sm text-ink-2 sm:hidden" aria-hidden="true">
        {head}:{' '}
      </span>
      {children}
    </Cell>
  );
}

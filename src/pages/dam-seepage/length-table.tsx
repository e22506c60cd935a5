import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { fixedText, sentenceText } from '#client/lib/figures.ts';
import { damSeepageText as text } from '#client/text/dam-seepage.ts';
import type { FlowUnit } from '#shared/compute/quantities/seepage-volume.ts';
import { metresPerLengthUnit } from '#shared/compute/units.ts';
import type { DamSeepageDto } from '#shared/contract/dam-seepage.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { FlowFigure } from './flow-figure.tsx';

/** What is to be known before the total is used, the reaches between the sections, and the total with its factor. */
export function LengthTable({ found, unit }: { found: DamSeepageDto; unit: FlowUnit }) {
  const { total, reaches, unitSystem, cautions } = found;
  if (total === null) return <p className="m-0 px-3.5 py-4 text-ink-2">{text.needsTwo}</p>;
  const { length } = unitNames(unitSystem);
  const metres = metresPerLengthUnit(unitSystem);
  const inUnit = (value: number) => fixedText(value / metres, 1);
  const flow = (value: number) => <FlowFigure flow={value} figures={total.figures} unit={unit} />;
  return (
    <>
      {cautions.length === 0 ? null : (
        <ul className="m-0 list-none border-b border-rule p-0">
          {cautions.map((caution) => (
            <li
              key={caution.code}
              className="border-l-[3px] border-attention bg-doubt px-3.5 py-1.5 text-attention"
            >
              {sentenceText(caution.text)}
            </li>
          ))}
        </ul>
      )}
      <Table caption={text.length}>
        <thead>
          <tr>
            <HeadCell numeric>{text.from(length)}</HeadCell>
            <HeadCell numeric>{text.to(length)}</HeadCell>
            <HeadCell numeric>{text.reach(length)}</HeadCell>
            <HeadCell numeric>{text.flow(unit)}</HeadCell>
          </tr>
        </thead>
        <tbody>
          {reaches.map((reach) => (
            <tr key={reach.from}>
              <Cell numeric>{inUnit(reach.from)}</Cell>
              <Cell numeric>{inUnit(reach.to)}</Cell>
              <Cell numeric>{inUnit(reach.length)}</Cell>
              <Cell numeric>{flow(reach.flow)}</Cell>
            </tr>
          ))}
          <tr className="font-bold">
            <Cell colSpan={2}>{text.total}</Cell>
            <Cell numeric>{inUnit(total.length)}</Cell>
            <Cell numeric>
              {flow(total.flow)}
              <span className="block font-normal whitespace-nowrap">
                {total.factor === null ? text.noFactor : `×/÷ ${fixedText(total.factor, 1)}`}
              </span>
            </Cell>
          </tr>
        </tbody>
      </Table>
    </>
  );
}

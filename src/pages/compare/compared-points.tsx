import { Cell, Table } from '#client/components/table.tsx';
import { type FigureUnits, figureLabel } from '#client/features/desk/components/figure-unit.ts';
import { sentenceText } from '#client/lib/figures.ts';
import { compareText as text } from '#client/text/compare.ts';
import { figureWords } from '#client/text/figure-names.ts';
import type { FigureGroup, FigureName } from '#shared/compute/compare-figures/figure-types.ts';
import type { FigureBeside, GroupBeside } from '#shared/compute/compare-figures/figures-beside.ts';
import { COMPARED_HEAD, type ComparedNames, FigureCells, OnlyIn } from './compared-tables.tsx';

const COLUMNS: ReadonlyArray<{ what: FigureName; quantity: FigureBeside['quantity'] }> = [
  { what: 'elevation', quantity: 'elevation' },
  { what: 'totalHead', quantity: 'totalHead' },
  { what: 'porePressure', quantity: 'pressure' },
];

interface ComparedPointsProps {
  points: readonly GroupBeside[];
  units: FigureUnits;
  names: ComparedNames;
  /** What gives no figures at all is said once, above everything. */
  unfinished: { one: boolean; other: boolean };
}

/** The reading points of both nets, matched by name: where they lie, their heads and pressures. */
export function ComparedPoints({ points, ...rest }: ComparedPointsProps) {
  const { units } = rest;
  return (
    <Table caption={text.points}>
      <thead>
        <tr>
          <th rowSpan={2} scope="col" className={`${COMPARED_HEAD} text-left`}>
            {text.point}
          </th>
          {COLUMNS.map(({ what, quantity }) => (
            <th key={what} scope="colgroup" colSpan={3} className={`${COMPARED_HEAD} border-l text-left`}>
              {figureLabel(what, quantity, units)}
            </th>
          ))}
        </tr>
        <tr>
          {COLUMNS.map(({ what }) =>
            [text.one, text.other, text.difference].map((word) => (
              <th key={`${what} ${word}`} scope="col" className={`${COMPARED_HEAD} text-right`}>
                {word}
              </th>
            )),
          )}
        </tr>
      </thead>
      <tbody>
        {points.map((group) => (
          <PointRows key={`${group.one?.id} ${group.other?.id}`} group={group} {...rest} />
        ))}
      </tbody>
    </Table>
  );
}

type PointRowsProps = Omit<ComparedPointsProps, 'points'> & { group: GroupBeside };

function PointRows({ group, units, names, unfinished }: PointRowsProps) {
  const remarks = [
    [names.one, unfinished.one ? '' : remarkOf(group.one)],
    [names.other, unfinished.other ? '' : remarkOf(group.other)],
  ].filter(([, remark]) => remark !== '');
  return (
    <>
      <tr>
        <th
          scope="row"
          className="min-w-28 border-b border-rule-2 px-3.5 py-[5px] text-left font-semibold max-sm:px-1.5"
        >
          {group.name || figureWords.unnamed}
          <OnlyIn group={group} names={names} />
        </th>
        {COLUMNS.map(({ what }) => {
          const figure = group.figures.find((each) => each.what === what);
          return figure ? (
            <FigureCells key={what} figure={figure} units={units} />
          ) : (
            <Cell key={what} colSpan={3} />
          );
        })}
      </tr>
      {remarks.length === 0 ? null : (
        <tr>
          <td colSpan={10} className="border-b border-rule-2 bg-doubt px-3.5 py-1 text-sm text-attention">
            {remarks.map(([name, remark]) => `${name}: ${remark}`).join(' ')}
          </td>
        </tr>
      )}
    </>
  );
}

/** Why a point has no figure, or that it lies above the water. */
function remarkOf(group: FigureGroup | null): string {
  if (group === null || group.status === 'read') return '';
  if (group.status === 'abovePhreatic') return `${figureWords.abovePhreatic}.`;
  return sentenceText(group.reason);
}

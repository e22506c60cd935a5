import { Cell, Table } from '#client/components/table.tsx';
import { differenceText, givenRuns } from '#client/features/desk/components/figure-beside.ts';
import { type FigureUnits, figureLabel } from '#client/features/desk/components/figure-unit.ts';
import { Runs } from '#client/features/desk/components/runs.tsx';
import { compareText as text } from '#client/text/compare.ts';
import { groupTitle } from '#client/text/figure-names.ts';
import type { FigureBeside, GroupBeside } from '#shared/compute/compare-figures/figures-beside.ts';

/** Names of nets are long: they wrap, and on a telephone four columns fit. */
export const COMPARED_HEAD =
  'border-b border-rule px-3.5 py-[5px] align-bottom text-sm font-semibold text-ink-2 max-sm:px-1.5';

export interface ComparedNames {
  one: string;
  other: string;
}

interface ComparedTableProps {
  caption: string;
  groups: readonly GroupBeside[];
  units: FigureUnits;
  names: ComparedNames;
  /** Whether each group stands under a name of its own. */
  titled: boolean;
}

/** Figures of both nets side by side, with the second less the first. */
export function ComparedTable({ caption, groups, units, names, titled }: ComparedTableProps) {
  return (
    <Table caption={caption}>
      <thead>
        <tr>
          {[text.figure, names.one, names.other, text.difference].map((head, i) => (
            <th key={head} scope="col" className={`${COMPARED_HEAD} ${i === 0 ? 'text-left' : 'text-right'}`}>
              {head}
            </th>
          ))}
        </tr>
      </thead>
      {groups.map((group) => (
        <tbody key={`${group.kind} ${(group.one ?? group.other)?.id}`}>
          {titled ? (
            <tr>
              <th
                scope="rowgroup"
                colSpan={4}
                className="px-3.5 pt-2.5 pb-1 text-left font-semibold max-sm:px-1.5"
              >
                {groupTitle(group)}
                <OnlyIn group={group} names={names} />
              </th>
            </tr>
          ) : null}
          {group.figures.filter(hasFigure).map((figure) => (
            <Row key={figure.what} figure={figure} units={units} />
          ))}
        </tbody>
      ))}
    </Table>
  );
}

const hasFigure = ({ values }: FigureBeside) => values !== 'none';

export function OnlyIn({ group, names }: { group: GroupBeside; names: ComparedNames }) {
  if (group.one !== null && group.other !== null) return null;
  return (
    <span className="ml-2 text-sm font-normal text-ink-2">
      {text.onlyIn(group.one === null ? names.other : names.one)}
    </span>
  );
}

function Row({ figure, units }: { figure: FigureBeside; units: FigureUnits }) {
  return (
    <tr>
      <th
        scope="row"
        className="border-b border-rule-2 px-3.5 py-[5px] text-left font-normal max-sm:px-1.5 max-sm:text-sm"
      >
        {figureLabel(figure.what, figure.quantity, units)}
      </th>
      <FigureCells figure={figure} units={units} />
    </tr>
  );
}

const FIGURE = 'whitespace-nowrap max-sm:px-1.5 max-sm:text-sm';

/** Both figures and their difference. */
export function FigureCells({ figure, units }: { figure: FigureBeside; units: FigureUnits }) {
  const { unitSystem } = units;
  return (
    <>
      <Cell numeric className={FIGURE}>
        <Runs runs={givenRuns(figure.one, figure, unitSystem)} />
      </Cell>
      <Cell numeric className={FIGURE}>
        <Runs runs={givenRuns(figure.other, figure, unitSystem)} />
      </Cell>
      <Cell numeric className={`${FIGURE} ${figure.values === 'differ' ? 'font-semibold' : 'text-ink-2'}`}>
        {differenceText(figure, unitSystem)}
      </Cell>
    </>
  );
}

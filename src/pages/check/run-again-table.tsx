import { Fragment, useMemo, useState } from 'react';
import { differenceText, givenRuns } from '#client/features/desk/components/figure-beside.ts';
import { type FigureUnits, figureLabel } from '#client/features/desk/components/figure-unit.ts';
import { Aside } from '#client/features/desk/components/margin-section.tsx';
import { FigureCell, MarginTable, RowHead } from '#client/features/desk/components/margin-table.tsx';
import { Runs } from '#client/features/desk/components/runs.tsx';
import { groupTitle } from '#client/text/figure-names.ts';
import { runAgainText as text } from '#client/text/run-again.ts';
import {
  differs,
  type FigureBeside,
  type GroupBeside,
} from '#shared/compute/compare-figures/figures-beside.ts';
import type { RunAgain } from '#shared/compute/compare-figures/run-again.ts';
import { shownGroups } from './shown-groups.ts';

interface RunAgainTableProps {
  result: RunAgain;
  units: FigureUnits;
  /** Engine by which the record was frozen, and the present one. */
  engines: readonly [frozen: string, now: string];
}

/** Each figure as frozen, as of now, and what lies between. */
export function RunAgainTable({ result, units, engines }: RunAgainTableProps) {
  const [onlyDiffering, setOnlyDiffering] = useState(false);
  const { head } = text;
  const { groups, equalPlaces, morePlaces } = useMemo(
    () => shownGroups(result.groups, onlyDiffering),
    [result, onlyDiffering],
  );
  return (
    <>
      {result.counts.differ > 0 ? (
        <label className="touch flex items-center gap-2 py-1">
          <input
            type="checkbox"
            className="size-4 shrink-0 accent-ink"
            checked={onlyDiffering}
            onChange={(event) => setOnlyDiffering(event.target.checked)}
          />
          {text.onlyDiffering}
        </label>
      ) : null}
      <MarginTable
        caption={text.caption}
        heads={[head.figure, head.frozen(engines[0]), head.now(engines[1]), head.difference]}
      >
        {groups.map((group) => (
          <Group key={keyOf(group)} group={group} units={units} />
        ))}
      </MarginTable>
      {equalPlaces > 0 ? <Aside>{text.equalPlaces(equalPlaces)}</Aside> : null}
      {morePlaces > 0 ? <Aside>{text.morePlaces(morePlaces)}</Aside> : null}
    </>
  );
}

const keyOf = ({ kind, one, other }: GroupBeside) => `${kind} ${(one ?? other)?.id}`;

function Group({ group, units }: { group: GroupBeside; units: FigureUnits }) {
  return (
    <>
      <tr>
        <th scope="rowgroup" colSpan={4} className="px-1.5 pt-2 pb-[3px] text-left font-semibold">
          {groupTitle(group)}
          {statusText(group) ? (
            <span className="font-normal text-attention"> {statusText(group)}</span>
          ) : null}
        </th>
      </tr>
      {group.figures.map((figure) => (
        <Fragment key={figure.what}>
          <Row figure={figure} units={units} />
        </Fragment>
      ))}
    </>
  );
}

/** What the two readings say of a place that only one of them reads. */
function statusText({ one, other }: GroupBeside): string {
  if (one === null || other === null || one.status === other.status) return '';
  return `${text.wasRead(text.statuses[one.status])} ${text.isRead(text.statuses[other.status])}`;
}

function Row({ figure, units }: { figure: FigureBeside; units: FigureUnits }) {
  const { unitSystem } = units;
  const marked = differs(figure) ? 'font-semibold text-attention' : '';
  return (
    <tr>
      <RowHead>{figureLabel(figure.what, figure.quantity, units)}</RowHead>
      <FigureCell>
        <Runs runs={givenRuns(figure.one, figure, unitSystem)} />
      </FigureCell>
      <FigureCell look={marked}>
        <Runs runs={givenRuns(figure.other, figure, unitSystem)} />
      </FigureCell>
      <FigureCell look={marked || 'text-ink-2'}>{differenceWords(figure, units)}</FigureCell>
    </tr>
  );
}

/** The difference, or that there is none to be seen. */
export function differenceWords(figure: FigureBeside, { unitSystem }: FigureUnits): string {
  if (!differs(figure)) return text.equal;
  if (figure.values !== 'differ') return text.plusMinusDiffers;
  const difference = differenceText(figure, unitSystem);
  return figure.plusMinuses === 'differ' && figure.difference !== null
    ? `${difference}, ${text.plusMinusDiffers}`
    : difference;
}

import { fixedText, NO_FIGURE, signedText } from '#client/lib/figures.ts';
import { deskToolText } from '#client/text/desk-tools.ts';
import { independentText as text } from '#client/text/independent.ts';
import type { SteepestExit } from '#shared/compute/beside/beside-solution.ts';
import type {
  ComparedFigure,
  IndependentComparison,
} from '#shared/compute/independent/compare-with-independent.ts';
import type { FlowNetDocument, SheetPoint, UnitSystem } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import { powerRuns } from './figure-runs.ts';
import { Aside } from './margin-section.tsx';
import { FigureCell, MarginTable, RowHead } from './margin-table.tsx';
import { Runs } from './runs.tsx';

const percent = (part: number | null) => (part === null ? NO_FIGURE : `${signedText(100 * part, 1)} %`);

/**
 * Heads of the net and of the solution at the reading points. `reading`: the traced net's, where its ± is to stand
 * beside the difference.
 */
export function HeadTable({
  comparison,
  document,
  reading = null,
}: {
  comparison: IndependentComparison;
  document: FlowNetDocument;
  reading?: NetReading | null;
}) {
  const { unitSystem, datum } = document;
  const level = elevationUnit(unitSystem, datum);
  const { length } = unitNames(unitSystem);
  const { head } = DECIMALS[unitSystem];
  if (comparison.points.length === 0) return <p className="m-0">{text.noPoints}</p>;
  return (
    <>
      <MarginTable
        caption={text.heads}
        heads={[
          text.head.point,
          text.head.traced(level),
          text.head.independent(level),
          text.head.difference(length),
          ...(reading ? [text.head.plusMinus(length)] : []),
          text.head.part,
        ]}
      >
        {comparison.points.map((point) => {
          const plusMinus = plusMinusOf(reading, point.id);
          const beyond = plusMinus !== null && Math.abs(point.difference ?? 0) > plusMinus;
          return (
            <tr key={point.id}>
              <RowHead strong>{point.name}</RowHead>
              <FigureCell>{fixedText(point.traced, head)}</FigureCell>
              <FigureCell>
                {point.independent === null ? text.outside : fixedText(point.independent, head)}
              </FigureCell>
              <FigureCell look={beyond ? 'font-semibold text-attention' : ''}>
                {signedText(point.difference, head)}
              </FigureCell>
              {reading ? <FigureCell>{fixedText(plusMinus, head)}</FigureCell> : null}
              <FigureCell>{percent(point.part)}</FigureCell>
            </tr>
          );
        })}
      </MarginTable>
      <Aside>
        {text.sign} {reading ? text.beyond : ''}
      </Aside>
    </>
  );
}

const plusMinusOf = (reading: NetReading | null, id: string) =>
  reading?.points.find((point) => point.id === id)?.totalHeadPlusMinus ?? null;

/** Figures in which two computations of a seepage can be compared. */
const SEEPAGE_FIGURES = 3;

/** Seepage of the net and of the solution, of all the water and to each outlet where there are several. */
export function SeepageTable({
  comparison,
  unitSystem,
}: {
  comparison: IndependentComparison;
  unitSystem: UnitSystem;
}) {
  const { seepage, outlets } = comparison;
  const rows: Array<{ id: string; label: string } & ComparedFigure> = [
    { id: 'all', label: text.all, ...seepage },
    ...(outlets.length > 1 ? outlets : []),
  ];
  return (
    <>
      <MarginTable
        caption={text.seepage}
        heads={[text.flowTo, text.flowHead.traced, text.flowHead.independent, text.flowHead.difference]}
      >
        {rows.map((row) => (
          <tr key={row.id}>
            <RowHead>{row.label}</RowHead>
            <FigureCell>
              <Power value={row.traced} />
            </FigureCell>
            <FigureCell>
              <Power value={row.independent} />
            </FigureCell>
            <FigureCell>{percent(row.part)}</FigureCell>
          </tr>
        ))}
      </MarginTable>
      <Aside>{text.seepageUnit[unitSystem]}</Aside>
    </>
  );
}

function Power({ value }: { value: number | null }) {
  return value === null ? NO_FIGURE : <Runs runs={powerRuns(value, SEEPAGE_FIGURES)} />;
}

/** The steepest place of each boundary where water comes out. */
export function ExitTable({
  exits,
  document,
  onPlace,
}: {
  exits: readonly SteepestExit[];
  document: FlowNetDocument;
  onPlace: (at: SheetPoint) => void;
}) {
  return (
    <MarginTable caption={text.exits} heads={[text.exit.boundary, text.exit.gradient, text.exit.place]}>
      {exits.map(({ id, at, gradient, hasSingular }) => (
        <tr key={id}>
          <RowHead>
            {boundaryName(document, id)}
            {hasSingular ? <span className="block text-attention">{text.singular}</span> : null}
          </RowHead>
          <FigureCell>{fixedText(gradient, 2)}</FigureCell>
          <FigureCell>
            <button
              type="button"
              aria-label={text.exitPlaceOf(boundaryName(document, id))}
              className="touch underline"
              onClick={() => onPlace(at)}
            >
              {text.exitPlace}
            </button>
          </FigureCell>
        </tr>
      ))}
    </MarginTable>
  );
}

function boundaryName(document: FlowNetDocument, id: string): string {
  const value = document.entities[id]?.value;
  if (value?.kind !== 'line') return text.exit.boundary;
  return value.name || deskToolText.lineKind(value.line);
}

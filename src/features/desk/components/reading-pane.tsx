import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { fixedText, sentenceText, signedText } from '#client/lib/figures.ts';
import { explanationText as text } from '#client/text/explanation.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { PointReading } from '#shared/contract/reading.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { DeskChecks, WaysState } from '../model/desk-checks.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { DoubtSharesList } from './doubt-shares.tsx';
import { FormPane } from './form-pane.tsx';
import type { MarginForm } from './margin-form.tsx';
import { Aside, MarginSection } from './margin-section.tsx';
import { FigureCell, MarginTable, RowHead } from './margin-table.tsx';
import { pointRemark } from './schedule-rows.ts';
import { usePointWays } from './use-point-ways.ts';

/** Two readings of one point farther apart than this, in drops, are flagged. */
const APART_DROPS = 0.1;

interface ReadingPaneProps {
  store: DeskStore;
  checks: DeskChecks;
  pointId: string;
  keepsFocus: boolean;
  onOpen: (form: MarginForm) => void;
  onClose: () => void;
  /** Shows the sheet, where it is not beside the pane already. */
  onSheet: () => void;
}

/** How the figure of a point came about, in words and over the sheet, and how far it can be trusted. */
export function ReadingPane({
  store,
  checks,
  pointId,
  keepsFocus,
  onOpen,
  onClose,
  onSheet,
}: ReadingPaneProps) {
  const document = useStore(store, (state) => state.document);
  const reading = useStore(store, (state) => state.reading);
  const readOnly = useStore(store, (state) => state.readOnly);
  const isCurrent = useStore(store, (state) => state.readingOf === state.documentRevision);
  const point = reading?.points.find(({ id }) => id === pointId);
  const byHand = point?.byHand ?? null;
  const ways = usePointWays(checks, isCurrent && byHand !== null ? document : null, pointId);
  if (!point) return null;
  return (
    <FormPane title={text.title(point.name)} onClose={onClose} keepsFocus={keepsFocus}>
      <Explanation point={point} />
      {point.sheetAt ? (
        <div>
          <Button
            look="quiet"
            onClick={() => {
              if (point.sheetAt) store.lookAt(point.sheetAt);
              onSheet();
            }}
          >
            {text.goThere}
          </Button>
        </div>
      ) : null}
      {byHand ? <TwoReadings point={point} document={document} ways={ways} /> : null}
      {point.doubt ? (
        <PointDoubt point={point} document={document} onOpen={readOnly ? null : onOpen} />
      ) : null}
      {point.status === 'read' ? (
        <MarginSection title={text.placeOfNet}>
          <Aside>{text.notTheNet}</Aside>
          <div>
            <button type="button" className="touch underline" onClick={() => onOpen({ form: 'independent' })}>
              {text.placeOfNet}
            </button>
          </div>
        </MarginSection>
      ) : null}
    </FormPane>
  );
}

function Explanation({ point }: { point: PointReading }) {
  const remark = pointRemark(point);
  return (
    <MarginSection title={text.result}>
      {point.status === 'withheld' ? <p className="m-0 text-attention">{text.notRead}</p> : null}
      <p className="m-0">{sentenceText(point.explanation)}</p>
      {remark && remark !== point.explanation ? <p className="m-0 text-attention">{remark}</p> : null}
    </MarginSection>
  );
}

interface FiguresProps {
  point: PointReading;
  document: FlowNetDocument;
}

function TwoReadings({ point, document, ways }: FiguresProps & { ways: WaysState }) {
  const { byHand, byField } = point;
  if (byHand === null) return null;
  const decimals = DECIMALS[document.unitSystem];
  const level = elevationUnit(document.unitSystem, document.datum);
  const apart = byField === null ? null : byField.dropsLost - byHand.dropsLost;
  const flagged = apart !== null && Math.abs(apart) > APART_DROPS;
  const heads = [text.way, text.drops, text.head(level)];
  return (
    <MarginSection title={text.twoWays}>
      <MarginTable caption={text.twoWays} heads={heads}>
        <tr>
          <RowHead>{text.hand}</RowHead>
          <FigureCell>{fixedText(byHand.dropsLost, decimals.drops)}</FigureCell>
          <FigureCell>{fixedText(byHand.totalHead, decimals.head)}</FigureCell>
        </tr>
        <tr>
          <RowHead strong>{byField ? text.field : text.noField}</RowHead>
          <FigureCell look="font-semibold">
            {fixedText(byField?.dropsLost ?? null, decimals.drops)}
          </FigureCell>
          <FigureCell look="font-semibold">{fixedText(byField?.totalHead ?? null, decimals.head)}</FigureCell>
        </tr>
        <tr>
          <RowHead strong={flagged}>{flagged ? text.differenceLarge : text.difference}</RowHead>
          <FigureCell look={flagged ? 'font-semibold text-attention' : ''}>
            {signedText(apart, decimals.drops)}
          </FigureCell>
          <FigureCell>
            {signedText(byField === null ? null : byField.totalHead - byHand.totalHead, decimals.head)}
          </FigureCell>
        </tr>
      </MarginTable>
      <div role="status">
        {ways === 'working' ? <Aside>{text.working}</Aside> : null}
        {ways === 'shown' ? <Aside>{text.drawn}</Aside> : null}
        {ways === 'failed' ? <p className="m-0 text-attention">{text.waysFailed}</p> : null}
      </div>
      <Aside>{text.sameLines}</Aside>
    </MarginSection>
  );
}

function PointDoubt({
  point,
  document,
  onOpen,
}: FiguresProps & { onOpen: ((form: MarginForm) => void) | null }) {
  if (point.doubt === null) return null;
  const { length, pressure } = unitNames(document.unitSystem);
  const decimals = DECIMALS[document.unitSystem];
  const figures = [
    {
      what: text.porePressure,
      plusMinus: fixedText(point.porePressurePlusMinus, decimals.pressure),
      unit: pressure,
      shares: point.doubt.porePressure,
    },
    {
      what: text.totalHead,
      plusMinus: fixedText(point.totalHeadPlusMinus, decimals.head),
      unit: length,
      shares: point.doubt.totalHead,
    },
  ];
  return (
    <MarginSection title={text.doubt}>
      <Aside>{text.sharesLead}</Aside>
      {figures.map(({ what, plusMinus, unit, shares }) => (
        <div key={what} className="flex flex-col gap-1">
          <h4 className="m-0 flex justify-between text-base font-semibold">
            <span>{what}</span>
            <span>{text.plusMinus(plusMinus, unit)}</span>
          </h4>
          <DoubtSharesList shares={shares} what={what.toLowerCase()} pointId={point.id} onOpen={onOpen} />
        </div>
      ))}
    </MarginSection>
  );
}

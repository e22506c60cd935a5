import type { ReactNode } from 'react';
import { useStore } from 'zustand';
import { fixedText, NO_FIGURE, plainText } from '#client/lib/figures.ts';
import { explanationText as text } from '#client/text/explanation.ts';
import { flowIn } from '#shared/compute/quantities/seepage-volume.ts';
import { permeabilityPerSecond } from '#shared/compute/units.ts';
import { type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { DECIMALS, unitNames } from '#shared/text/unit-text.ts';
import { flowUnitChoice, ownFlowUnit } from '../model/flow-unit.ts';
import type { DeskFormProps } from './desk-form.ts';
import { figuresEntered, powerRuns } from './figure-runs.ts';
import { FlowUnitField } from './flow-unit-field.tsx';
import { FormFindings, FormPane, findingsFor } from './form-pane.tsx';
import type { MarginForm } from './margin-form.tsx';
import { Aside, MarginSection } from './margin-section.tsx';
import { FigureCell, MarginTable, RowHead } from './margin-table.tsx';
import { Runs } from './runs.tsx';
import { SeepageDoubt } from './seepage-doubt.tsx';

interface SeepagePaneProps extends Pick<DeskFormProps, 'document' | 'reading' | 'disabled' | 'onClose'> {
  onOpen: (form: MarginForm) => void;
}

/** What the seepage is made of, within which factor it is known, and what that hangs on. */
export function SeepagePane({ document, reading, disabled, onClose, onOpen }: SeepagePaneProps) {
  const change = disabled ? null : onOpen;
  return (
    <FormPane title={text.seepageTitle} onClose={onClose}>
      <FormFindings findings={findingsFor(reading?.findings, 'seepage')} />
      {reading && reading.quantities.seepage !== null ? (
        <Terms document={document} reading={reading} onOpen={change} />
      ) : (
        <p className="m-0 text-attention">{text.seepageNone}</p>
      )}
      <SeepageDoubt reading={reading} onOpen={change} />
      <FlowUnitField unitSystem={document.unitSystem} />
    </FormPane>
  );
}

interface TermsProps {
  document: FlowNetDocument;
  reading: NetReading;
  onOpen: ((form: MarginForm) => void) | null;
}

function Terms({ document, reading, onOpen }: TermsProps) {
  const { unitSystem } = document;
  const unit = useStore(flowUnitChoice, (state) => state.unit) ?? ownFlowUnit(unitSystem);
  const { seepage, seepageFigures, channels, headPerDrop } = reading.quantities;
  const { seepageTerms: terms } = text;
  const flow = (value: number) => powerRuns(flowIn(unit, value, unitSystem), seepageFigures);
  const measured = reading.netCheck?.measuredSeepage ?? null;
  const ratio = singleOf(document, 'netCount')?.value.cellRatio ?? null;
  return (
    <MarginSection title={text.seepage}>
      <Aside>{text.seepageLead}</Aside>
      <MarginTable caption={text.seepageTitle} heads={[terms.term, terms.value, text.change]}>
        <Term name={terms.k} form={formOfCounted(document, reading)} onOpen={onOpen}>
          <Permeability document={document} reading={reading} />
        </Term>
        <Term name={terms.headPerDrop(unitNames(unitSystem).length)} form={{ form: 'water' }} onOpen={onOpen}>
          {headPerDrop === null ? terms.unequal : fixedText(headPerDrop, DECIMALS[unitSystem].head)}
        </Term>
        <Term name={terms.channels} form={{ form: 'count' }} onOpen={onOpen}>
          {plainText(channels)}
        </Term>
        <Term name={terms.ratio} form={{ form: 'count' }} onOpen={onOpen}>
          {plainText(ratio)}
        </Term>
        <tr>
          <RowHead strong>{terms.q(`${unit} ${terms.perRun[unitSystem]}`)}</RowHead>
          <FigureCell look="font-semibold">
            {seepage === null ? NO_FIGURE : <Runs runs={flow(seepage)} />}
          </FigureCell>
          <FigureCell>{''}</FigureCell>
        </tr>
      </MarginTable>
      <CountingPermeability document={document} reading={reading} ratio={ratio} />
      {measured === null ? null : (
        <Aside>
          {text.measured}{' '}
          <span className="whitespace-nowrap">
            <Runs runs={flow(measured)} /> {unit}
          </span>{' '}
          {terms.perRun[unitSystem]}.
        </Aside>
      )}
    </MarginSection>
  );
}

/** Parts by which the k that counts may differ from the one entered through rounding alone. */
const ROUNDING = 1e-6;

/** The k that q counts, where it is not the one entered: √(kh·kv) of the transformed section. */
function CountingPermeability({
  document,
  reading,
  ratio,
}: Pick<TermsProps, 'document' | 'reading'> & { ratio: number | null }) {
  const { unitSystem } = document;
  const soil = countedSoil(document, reading)?.soil ?? singleOf(document, 'permeability')?.value;
  const { seepage, headPerDrop, channels } = reading.quantities;
  if (!soil || soil.k === null || seepage === null || !headPerDrop || !channels || !ratio) return null;
  const counts = seepage / (headPerDrop * channels * ratio);
  if (Math.abs(counts / permeabilityPerSecond(soil.k, soil.unit, unitSystem) - 1) < ROUNDING) return null;
  return (
    <Aside>
      {text.counts} <Runs runs={powerRuns(counts, 3)} /> {unitSystem === 'SI' ? 'm/s' : 'ft/s'}.
    </Aside>
  );
}

function Term({
  name,
  form,
  onOpen,
  children,
}: {
  name: string;
  form: MarginForm;
  onOpen: TermsProps['onOpen'];
  children: ReactNode;
}) {
  return (
    <tr>
      <RowHead>{name}</RowHead>
      <FigureCell>{children}</FigureCell>
      <FigureCell>
        {onOpen ? (
          <button
            type="button"
            aria-label={text.changeTerm(name)}
            className="touch underline"
            onClick={() => onOpen(form)}
          >
            {text.change}
          </button>
        ) : null}
      </FigureCell>
    </tr>
  );
}

/** The soil in which the channels are counted; the section's own where no other is. */
function countedSoil(document: FlowNetDocument, reading: NetReading) {
  const id = reading.soils?.counted ?? null;
  const value = id === null ? undefined : document.entities[id]?.value;
  return value?.kind === 'soil' ? { id, soil: value } : null;
}

function formOfCounted(document: FlowNetDocument, reading: NetReading): MarginForm {
  const counted = countedSoil(document, reading);
  return counted?.id ? { form: 'soil', soilId: counted.id } : { form: 'permeability' };
}

/** k as entered, and with it the k across the bedding where the two differ: then √(kh·kv) counts. */
function Permeability({ document, reading }: Pick<TermsProps, 'document' | 'reading'>) {
  const held = countedSoil(document, reading)?.soil ?? singleOf(document, 'permeability')?.value;
  if (!held || held.k === null) return NO_FIGURE;
  const { k, kv, unit } = held;
  const along = powerRuns(k, figuresEntered(k));
  if (kv === null || kv === k) return <Runs runs={[...along, ` ${unit}`]} />;
  return <Runs runs={['√(', ...along, ' · ', ...powerRuns(kv, figuresEntered(kv)), `) ${unit}`]} />;
}

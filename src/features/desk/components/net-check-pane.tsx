import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { CheckField } from '#client/components/field.tsx';
import { fixedText, sentenceText } from '#client/lib/figures.ts';
import { netCheckText as text } from '#client/text/net-check.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import type { Finding, NetReading } from '#shared/contract/reading.ts';
import type { NetCheckReading, NetFault } from '#shared/contract/reading-net-check.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { faultKey } from '../model/check-guides.ts';
import type { DeskChecks } from '../model/desk-checks.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { faultPlace } from './fault-place.ts';
import { FindingsList } from './findings-list.tsx';
import { FormPane } from './form-pane.tsx';
import type { MarginForm } from './margin-form.tsx';
import { Aside, MarginSection } from './margin-section.tsx';
import { FigureCell, MarginTable, RowHead } from './margin-table.tsx';
import { PhreaticCheck } from './phreatic-check.tsx';
import { byWeight } from './title-block-cells.ts';

interface NetCheckPaneProps {
  store: DeskStore;
  checks: DeskChecks;
  onShow: (finding: Finding) => void;
  onOpen: (form: MarginForm) => void;
  onClose: () => void;
  /** Shows the sheet, where it is not beside the pane already. */
  onSheet: () => void;
}

/** How well the net is drawn and where it is poor, all that was found about it, and the way to the solution beside it. */
export function NetCheckPane({ store, checks, onShow, onOpen, onClose, onSheet }: NetCheckPaneProps) {
  const reading = useStore(store, (state) => state.reading);
  const check = reading?.netCheck ?? null;
  return (
    <FormPane title={text.title} onClose={onClose}>
      {reading ? null : <p className="m-0 text-ink-2">{text.working}</p>}
      {reading && check ? (
        <Drawing reading={reading} check={check} store={store} checks={checks} onSheet={onSheet} />
      ) : null}
      {reading?.phreatic ? (
        <PhreaticCheck
          document={store.getState().document}
          phreatic={reading.phreatic}
          onShow={(at) => {
            store.lookAt(at);
            onSheet();
          }}
        />
      ) : null}
      {reading ? (
        <MarginSection title={text.found}>
          <FindingsList findings={byWeight(reading.findings)} onShow={onShow} />
        </MarginSection>
      ) : null}
      <MarginSection title={text.independent}>
        <Aside>{text.independentLead}</Aside>
        <div>
          <Button look="quiet" onClick={() => onOpen({ form: 'independent' })}>
            {text.open}
          </Button>
        </div>
      </MarginSection>
    </FormPane>
  );
}

interface DrawingProps {
  reading: NetReading;
  check: NetCheckReading;
  store: DeskStore;
  checks: DeskChecks;
  onSheet: () => void;
}

function Drawing({ reading, check, store, checks, onSheet }: DrawingProps) {
  const shown = useStore(checks, (state) => state.netCheckShown);
  const chosen = useStore(checks, (state) => state.chosenFault);
  const unitSystem = useStore(store, (state) => state.document.unitSystem);
  const { summary, faults } = check;
  return (
    <>
      <MarginSection title={text.drawing}>
        <p className="m-0">{sentenceText(summary.text)}.</p>
        <Aside>
          {text.counts(summary.cellsJudged, summary.cellsPoor, summary.anglesJudged, summary.anglesPoor)}
        </Aside>
        <CheckField
          label={text.show}
          checked={shown}
          onChange={(event) => checks.showNetCheck(event.target.checked)}
        />
      </MarginSection>
      <MarginSection title={text.worst}>
        {faults.length === 0 ? <p className="m-0">{text.allGood}</p> : <Aside>{text.worstLead}</Aside>}
        <ol className="m-0 list-none p-0">
          {faults.map((fault) => (
            <Fault
              key={faultKey(fault)}
              fault={fault}
              place={faultPlace(fault, check, reading.lines)}
              unitSystem={unitSystem}
              chosen={faultKey(fault) === chosen}
              onChoose={() => {
                checks.chooseFault(faultKey(fault));
                store.lookAt([fault.at[0], fault.at[1]]);
                onSheet();
              }}
            />
          ))}
        </ol>
      </MarginSection>
      {check.hasChannels && check.channels.length > 0 ? <Channels check={check} /> : null}
    </>
  );
}

function Fault({
  fault,
  place,
  unitSystem,
  chosen,
  onChoose,
}: {
  fault: NetFault;
  /** Between which lines it lies. */
  place: string;
  unitSystem: UnitSystem;
  chosen: boolean;
  onChoose: () => void;
}) {
  const { drops, pressure } = fault.effect;
  return (
    <li className="border-b border-rule-2 last:border-b-0">
      <button
        type="button"
        aria-current={chosen}
        className={`touch grid w-full grid-cols-[minmax(0,1fr)_auto] gap-x-3 px-1.5 py-1 text-left hover:bg-hover ${chosen ? 'bg-chosen font-semibold' : ''}`}
        onClick={onChoose}
      >
        <span>
          {sentenceText(fault.text)}
          <span className="block text-sm font-normal text-ink-2">{place}</span>
        </span>
        <span className="text-right whitespace-nowrap text-ink-2">
          {text.effect(drops)}
          {pressure === null ? null : (
            <span className="block">{text.pressure(pressure, unitNames(unitSystem).pressure)}</span>
          )}
        </span>
      </button>
    </li>
  );
}

function Channels({ check }: { check: NetCheckReading }) {
  return (
    <MarginSection title={text.channels}>
      <MarginTable caption={text.channels} heads={[text.channels, text.channelFlow, '']}>
        {check.channels.map((channel, i) => (
          <tr key={`${channel.left} ${channel.right}`}>
            <RowHead>{text.channel(i + 1)}</RowHead>
            <FigureCell>{fixedText(channel.share, 2)}</FigureCell>
            <FigureCell look={channel.judgement === 'poor' ? 'font-semibold text-attention' : 'text-ink-2'}>
              {text.channelStates[channel.judgement]}
            </FigureCell>
          </tr>
        ))}
      </MarginTable>
    </MarginSection>
  );
}

import { useState } from 'react';
import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { fixedText, plainText } from '#client/lib/figures.ts';
import { adoptionText } from '#client/text/adoption.ts';
import { lineText as text, waterText } from '#client/text/desk-forms.ts';
import { editingText } from '#client/text/editing-lines.ts';
import type { TracedLine } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { elevationUnit } from '#shared/text/unit-text.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { DeskFormProps } from './desk-form.ts';
import { Choice, Figure, NeededFigure, Words } from './form-fields.tsx';
import { FormFindings, FormPane } from './form-pane.tsx';
import { LineOperations } from './line-operations.tsx';
import { VertexTable } from './vertex-table.tsx';

/** Properties of one traced line; which of them matter depends on its kind. */
export function LineForm({ lineId, store, ...form }: DeskFormProps & { lineId: string; store: DeskStore }) {
  const { document, reading, run, onClose } = form;
  const value = document.entities[lineId]?.value;
  const locked = useStore(
    store,
    ({ lockedKinds }) => value?.kind === 'line' && lockedKinds.includes(value.line),
  );
  const disabled = form.disabled || locked;
  if (value?.kind !== 'line') return null;
  const kind = text.kinds[value.line];
  const change = (changes: Partial<TracedLine>) =>
    run(text.labels.changed(kind), [{ op: 'put', entityId: lineId, value: { ...value, ...changes } }]);
  const remove = () => {
    run(text.labels.removed(kind), [{ op: 'remove', entityId: lineId }]);
    onClose();
  };
  const findings = (reading?.findings ?? []).filter((found) => found.entityIds.includes(lineId));
  return (
    <FormPane title={value.name ? `${kind} ${value.name}` : kind} onClose={onClose}>
      {locked ? <p className="m-0 text-attention">{editingText.lockedLine}</p> : null}
      {value.finished ? null : <p className="m-0 text-attention">{text.unfinished}</p>}
      {value.origin === 'guessed' ? (
        <div>
          <p className="mt-0 mb-1.5 text-attention">{text.guessed}</p>
          <Button disabled={disabled} onClick={() => change({ origin: 'traced' })}>
            {text.takeAsTraced}
          </Button>
        </div>
      ) : null}
      {value.origin === 'adopted' ? <p className="m-0 text-ink-2">{adoptionText.ofLine}</p> : null}
      <FormFindings findings={findings} />
      {disabled ? null : <LineOperations store={store} />}
      <Choice
        label={text.kind}
        value={value.line}
        names={text.kinds}
        disabled={disabled}
        onCommit={(line) => change(afterKind(line))}
      />
      <Words
        label={text.name}
        value={value.name}
        maxLength={120}
        disabled={disabled}
        onCommit={(name) => change({ name })}
      />
      <KindFields line={value} lineId={lineId} form={{ ...form, disabled }} change={change} />
      <VertexTable store={store} lineId={lineId} line={value} disabled={disabled} />
      {disabled ? null : (
        <div className="border-t border-rule pt-3">
          <Button look="wrong" onClick={remove}>
            {text.remove}
          </Button>
        </div>
      )}
    </FormPane>
  );
}

/** A line of another kind keeps nothing that only made sense for the old one. */
const afterKind = (line: TracedLine['line']): Partial<TracedLine> => ({
  line,
  water: null,
  head: null,
  drops: null,
});

interface KindFieldsProps {
  line: TracedLine;
  lineId: string;
  form: DeskFormProps;
  change: (changes: Partial<TracedLine>) => void;
}

function KindFields({ line, lineId, form, change }: KindFieldsProps) {
  if (line.line === 'equipotential') return <CountFields {...{ line, lineId, form, change }} />;
  if (line.line === 'drain') return <DrainFields {...{ line, lineId, form, change }} />;
  if (line.line !== 'submergedFace') return null;
  return (
    <Choice
      label={text.water}
      value={line.water ?? ''}
      names={text.waters}
      disabled={form.disabled}
      onCommit={(water) => change({ water: water === '' ? null : water })}
    />
  );
}

function CountFields({ line, lineId, form, change }: KindFieldsProps) {
  const { document, reading, disabled } = form;
  return (
    <>
      <p className="m-0">
        {countedText(reading, lineId, elevationUnit(document.unitSystem, document.datum))}
      </p>
      <Figure
        label={text.typedDrops}
        hint={text.typedHint}
        value={line.drops}
        optional
        atLeast={{ least: 0, fault: text.dropsTooSmall }}
        disabled={disabled}
        // A line has one head: typing the one way takes the other back.
        onCommit={(drops) => change(drops === null ? { drops } : { drops, head: null })}
      />
      <Figure
        label={text.typedHead(elevationUnit(document.unitSystem, document.datum))}
        value={line.head}
        optional
        disabled={disabled}
        onCommit={(head) => change(head === null ? { head } : { head, drops: null })}
      />
    </>
  );
}

function countedText(reading: NetReading | null, lineId: string, unit: string): string {
  const read = reading?.lines.find((each) => each.id === lineId);
  if (!read || read.drops === null) return text.uncounted;
  const drops = plainText(read.drops);
  return read.head === null ? text.placed(drops) : text.counted(drops, `${fixedText(read.head, 2)} ${unit}`);
}

/** A drain is under pressure only once its head is typed: until then it stays empty in the document. */
function DrainFields({ line, form, change }: KindFieldsProps) {
  const { document, disabled } = form;
  const [asked, setAsked] = useState(false);
  const pressure = line.head !== null || asked;
  const choose = (state: 'empty' | 'pressure') => {
    setAsked(state === 'pressure');
    if (state === 'empty' && line.head !== null) change({ head: null });
  };
  return (
    <>
      <Choice
        label={text.drainState}
        value={pressure ? 'pressure' : 'empty'}
        names={waterText.drainStates}
        disabled={disabled}
        onCommit={choose}
      />
      {pressure ? (
        <NeededFigure
          label={waterText.drainHead(elevationUnit(document.unitSystem, document.datum))}
          value={line.head}
          disabled={disabled}
          onCommit={(head) => change({ head })}
        />
      ) : null}
    </>
  );
}

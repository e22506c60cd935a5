import { type FormEvent, type KeyboardEvent, type ReactNode, useState } from 'react';
import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { NumberField, SelectField, TextArea, TextField } from '#client/components/field.tsx';
import { numberFault } from '#client/lib/number-fault.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { lineText, pointFormText } from '#client/text/desk-forms.ts';
import { entityTableText as text } from '#client/text/entity-table.ts';
import { scheduleText, typedNumberText } from '#client/text/schedule.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { LineKind } from '#shared/contract/document.ts';
import { pastePoints } from '#shared/text/paste-points.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { LINE_KINDS } from '../model/sheet-kinds.ts';
import { freeName, typedKnownPoint, typedLine } from '../model/typed-entities.ts';
import { placeHeads } from './entity-table-points.tsx';
import { addTypedPoint } from './schedule-edits.ts';

/** A line by the figures of its points, typed or pasted. */
export function AddLine({ store }: { store: DeskStore }) {
  const document = useStore(store, (state) => state.document);
  const { map } = readSetOut(document);
  const [kind, setKind] = useState<LineKind>('equipotential');
  const [name, setName] = useState('');
  const [places, setPlaces] = useState('');
  const [fault, setFault] = useState<string | null>(null);

  function submit(event: FormEvent) {
    event.preventDefault();
    const found = pastePoints(places);
    if (!found.ok) {
      const [first] = found.errors;
      return setFault(first === undefined ? null : text.faultAt(first.line, first.text));
    }
    const line = typedLine(kind, name.trim(), found.points, map);
    if (typeof line === 'string') return setFault(line);
    const id = store.newId();
    const ran = store.run(text.labels.addedLine(line), [{ op: 'put', entityId: id, value: line }]);
    if (!ran.ok) return setFault(ran.reason);
    store.select({ kind: 'line', ids: [id] });
    setPlaces('');
    setName('');
    setFault(null);
  }

  return (
    <Add title={text.addLine} onSubmit={submit}>
      <SelectField
        label={text.kind}
        value={kind}
        onChange={(event) => setKind(event.target.value as LineKind)}
      >
        {LINE_KINDS.map((each) => (
          <option key={each} value={each}>
            {lineText.kinds[each]}
          </option>
        ))}
      </SelectField>
      <TextField
        label={text.name}
        value={name}
        maxLength={120}
        autoComplete="off"
        onChange={(event) => setName(event.target.value)}
      />
      <TextArea
        label={text.places}
        hint={text.placesHint[map === null ? 'sheet' : 'section']}
        error={fault}
        className="grow basis-80"
        spellCheck={false}
        value={places}
        onChange={(event) => setPlaces(event.target.value)}
      />
    </Add>
  );
}

export function AddReadingPoint({ store }: { store: DeskStore }) {
  const document = useStore(store, (state) => state.document);
  const reading = useStore(store, (state) => state.reading);
  const heads = placeHeads(document);
  return (
    <AddPoint
      title={text.addReadingPoint}
      heads={heads}
      hint={readSetOut(document).map === null ? scheduleText.needsSetOut : null}
      suggested={freeName(document, 'readingPoint', 'P')}
      onAdd={(name, [offset, elevation]) => {
        const edit = addTypedPoint(store.newId(), { name, offset, elevation }, reading?.points ?? []);
        store.run(edit.label, edit.ops);
      }}
    />
  );
}

export function AddKnownPoint({ store }: { store: DeskStore }) {
  const document = useStore(store, (state) => state.document);
  return (
    <AddPoint
      title={text.addKnownPoint}
      heads={[text.x, text.y]}
      suggested={freeName(document, 'knownPoint', 'K')}
      onAdd={(name, at) =>
        store.run(text.labels.addedPoint(name), [
          { op: 'put', entityId: store.newId(), value: typedKnownPoint(document, name, at) },
        ])
      }
    />
  );
}

interface AddPointProps {
  title: string;
  heads: readonly [string, string];
  hint?: string | null;
  suggested: string;
  onAdd: (name: string, figures: readonly [number, number]) => void;
}

const EMPTY = ['', ''] as const;

function AddPoint({ title, heads, hint = null, suggested, onAdd }: AddPointProps) {
  const [name, setName] = useState('');
  const [typed, setTyped] = useState<readonly [string, string]>(EMPTY);
  const [faults, setFaults] = useState<ReadonlyArray<string | null>>([]);

  function submit(event: FormEvent) {
    event.preventDefault();
    setFaults(typed.map(faultOf));
    const [first, second] = typed.map((each) => parseTypedNumber(each));
    if (first == null || second == null) return;
    onAdd(name.trim() || suggested, [first, second]);
    setName('');
    setTyped(EMPTY);
  }

  return (
    <Add title={title} onSubmit={submit}>
      <TextField
        label={pointFormText.name}
        hint={hint}
        placeholder={suggested}
        maxLength={120}
        autoComplete="off"
        value={name}
        onChange={(event) => setName(event.target.value)}
      />
      {([0, 1] as const).map((axis) => (
        <NumberField
          key={axis}
          label={heads[axis]}
          error={faults[axis] ?? null}
          value={typed[axis]}
          onChange={({ target: { value } }) => setTyped(axis === 0 ? [value, typed[1]] : [typed[0], value])}
        />
      ))}
    </Add>
  );
}

function faultOf(typed: string): string | null {
  if (typed.trim() === '') return typedNumberText.needed;
  return parseTypedNumber(typed) === null ? numberFault(typed) : null;
}

interface AddProps {
  title: string;
  onSubmit: (event: FormEvent) => void;
  children: ReactNode;
}

function Add({ title, onSubmit, children }: AddProps) {
  return (
    <form
      noValidate
      aria-label={title}
      className="mt-2 border-b border-rule pb-4"
      onSubmit={onSubmit}
      onKeyDown={leaveFilledField}
    >
      <h4 className="mt-0 mb-1 text-sm font-semibold">{title}</h4>
      <div className="flex flex-wrap items-start gap-3">{children}</div>
      <div className="mt-2">
        <Button type="submit" look="quiet">
          {title}
        </Button>
      </div>
    </form>
  );
}

/** Escape leaves a field in which something stands, and does not close the table with what was typed. */
function leaveFilledField(event: KeyboardEvent<HTMLFormElement>): void {
  const { target, currentTarget } = event;
  const isField = target instanceof HTMLInputElement || target instanceof HTMLTextAreaElement;
  if (event.key !== 'Escape' || !isField || target.value === '') return;
  event.preventDefault();
  event.stopPropagation();
  currentTarget.querySelector('button')?.focus();
}

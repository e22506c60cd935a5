import { useEffect, useRef } from 'react';
import { formText, setOutText as text } from '#client/text/desk-forms.ts';
import { placingText as placing } from '#client/text/set-out.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { DeskFormProps } from './desk-form.ts';
import { Choice, Figure, Words } from './form-fields.tsx';
import { GivenByPoint, PlaceOnSheet, Residual } from './known-point-facts.tsx';

type KnownPoint = { id: string; value: EntityOf<'knownPoint'> };

type RowsProps = DeskFormProps & {
  method: EntityOf<'setOut'>['method'];
  /** The two points between which a scale bar lies that checks the fit; empty without one. */
  barEnds: readonly string[];
};

/** One block for each known point: what is typed for it, what it is used for, and how far off the fit passes it. */
export function KnownPointRows({
  points,
  placedId,
  ...form
}: RowsProps & {
  points: readonly KnownPoint[];
  /** The point just placed: what is typed next is its offset. */
  placedId: string | null;
}) {
  const list = useRef<HTMLUListElement>(null);
  useEffect(() => {
    if (placedId)
      list.current?.querySelector<HTMLInputElement>(`[data-offset-of="${placedId}"] input`)?.focus();
  }, [placedId]);
  if (points.length === 0) return <p className="m-0 text-ink-2">{text.none}</p>;
  return (
    <ul ref={list} className="m-0 list-none border-t border-rule p-0">
      {points.map((point) => (
        <li key={point.id} className="border-b border-rule py-2">
          <KnownPointRow point={point} {...form} />
        </li>
      ))}
    </ul>
  );
}

function KnownPointRow({
  point,
  document,
  reading,
  disabled,
  run,
  method,
  barEnds,
}: RowsProps & { point: KnownPoint }) {
  const { id, value } = point;
  const name = value.name || text.unnamed;
  const unit = unitNames(document.unitSystem).length;
  const change = (changes: Partial<EntityOf<'knownPoint'>>, label: string = text.labels.point(name)) =>
    run(label, [{ op: 'put', entityId: id, value: { ...value, ...changes } }]);
  return (
    <fieldset className="m-0 border-0 p-0">
      <legend className="sr-only">{name}</legend>
      <div className="grid grid-cols-[minmax(60px,2fr)_3fr_3fr] gap-2">
        <Words
          label={text.name}
          value={value.name}
          maxLength={120}
          disabled={disabled}
          onCommit={(next) => change({ name: next })}
        />
        <div data-offset-of={id}>
          <Figure
            label={text.offset(unit)}
            value={value.offset}
            optional
            disabled={disabled}
            onCommit={(offset) => change({ offset })}
          />
        </div>
        <Figure
          label={text.elevation(elevationUnit(document.unitSystem, document.datum))}
          value={value.elevation}
          optional
          disabled={disabled}
          onCommit={(elevation) => change({ elevation })}
        />
      </div>
      <div className="mt-1.5 flex flex-wrap items-end gap-x-3 gap-y-1">
        <Choice
          label={text.use}
          value={value.use}
          names={method === 'distance' ? placing.usesOfLength : text.uses}
          disabled={disabled}
          onCommit={(use) => change({ use })}
        />
        {disabled ? null : (
          <button
            type="button"
            aria-label={formText.removeNamed(name)}
            className="touch mb-1.5 text-sm text-ink-2 underline"
            onClick={() => run(text.labels.removed(name), [{ op: 'remove', entityId: id }])}
          >
            {formText.remove}
          </button>
        )}
      </div>
      <GivenByPoint value={value} method={method} isBarEnd={barEnds.includes(id)} />
      <Residual id={id} reading={reading} unit={unit} />
      <PlaceOnSheet
        at={value.at}
        sheet={document.sheet}
        disabled={disabled}
        onCommit={(at) => change({ at }, placing.movedPlace(name))}
      />
    </fieldset>
  );
}

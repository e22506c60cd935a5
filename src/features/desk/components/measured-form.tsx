import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { measuredText as text } from '#client/text/measured.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { DeskFormProps } from './desk-form.ts';
import { Choice, Figure, Words } from './form-fields.tsx';
import { FormPane } from './form-pane.tsx';
import { changeMeasured, changeTip, clearMeasured, type Measured } from './measured-edits.ts';
import { MEASURED_COLOURS, measuredSentence, measuredState } from './measured-words.ts';
import type { Edit } from './schedule-edits.ts';

/** What an instrument showed at a reading point, and how it stands to the net. */
export function MeasuredForm({ pointId, ...form }: DeskFormProps & { pointId: string }) {
  const { document, reading, disabled, run, onClose } = form;
  const value = document.entities[pointId]?.value;
  if (value?.kind !== 'readingPoint') return null;
  const take = (edit: Edit | null) => edit && run(edit.label, edit.ops);
  const compared = reading?.measured.find((each) => each.id === pointId);
  const { length } = unitNames(document.unitSystem);
  return (
    <FormPane title={text.title(value.name)} onClose={onClose}>
      <p className="m-0 text-ink-2">{text.lead}</p>
      {compared ? (
        <p role="status" className={`m-0 ${MEASURED_COLOURS[measuredState(compared)]}`}>
          {measuredSentence(compared, document.unitSystem, length)}
        </p>
      ) : null}
      <MeasuredFields pointId={pointId} point={value} form={form} take={take} />
      {value.place.on === 'section' ? (
        <Figure
          label={text.tip(length)}
          hint={text.tipHint}
          value={value.elevationPlusMinus}
          optional
          atLeast={{ least: 0, fault: text.tooSmall }}
          disabled={disabled}
          onCommit={(plusMinus) => take(changeTip(pointId, value, plusMinus))}
        />
      ) : null}
      {value.measured === null || disabled ? null : (
        <div className="border-t border-rule pt-3">
          <Button look="quiet" onClick={() => take(clearMeasured(pointId, value))}>
            {text.clear}
          </Button>
        </div>
      )}
    </FormPane>
  );
}

interface FieldsProps {
  pointId: string;
  point: EntityOf<'readingPoint'>;
  form: Omit<DeskFormProps, 'onClose'>;
  take: (edit: Edit | null) => void;
}

/**
 * What was read is chosen before there is a figure, so it is held here until one is typed. Choosing another takes the
 * figure away: metres must not become kilopascals unseen.
 */
function MeasuredFields({ pointId, point, form: { document, disabled }, take }: FieldsProps) {
  const [chosen, setChosen] = useState<Measured['as']>(point.measured?.as ?? 'totalHead');
  const { measured } = point;
  const as = measured?.as ?? chosen;
  const { length, pressure } = unitNames(document.unitSystem);
  const level = elevationUnit(document.unitSystem, document.datum);
  const change = (changes: Partial<Measured>) => take(changeMeasured(pointId, point, changes));
  return (
    <>
      <Choice
        label={text.as}
        value={as}
        names={text.kinds}
        disabled={disabled}
        onCommit={(next) => {
          setChosen(next);
          if (measured !== null) take(clearMeasured(pointId, point));
        }}
      />
      <div className="grid grid-cols-2 items-end gap-2">
        <Figure
          label={text.values[as]({ level, length, pressure })}
          value={measured?.value ?? null}
          disabled={disabled}
          onCommit={(next) => next !== null && change({ value: next, as })}
        />
        <Figure
          label={text.plusMinus(as === 'porePressure' ? pressure : length)}
          value={measured?.plusMinus ?? null}
          optional
          atLeast={{ least: 0, fault: text.tooSmall }}
          disabled={disabled || measured === null}
          onCommit={(plusMinus) => change({ plusMinus })}
        />
      </div>
      <p className="m-0 text-sm text-ink-2">{text.plusMinusHint}</p>
      <Words
        label={text.on}
        hint={text.onHint}
        value={measured?.on ?? ''}
        maxLength={40}
        disabled={disabled || measured === null}
        onCommit={(on) => change({ on })}
      />
    </>
  );
}

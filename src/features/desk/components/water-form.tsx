import { Button } from '#client/components/button.tsx';
import type { BoundaryKind } from '#client/features/desk/model/tool-choice.ts';
import { fixedText } from '#client/lib/figures.ts';
import { formText, waterText as text } from '#client/text/desk-forms.ts';
import { type EntityOf, entitiesOf, singleOf } from '#shared/contract/document.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { DeskFormProps } from './desk-form.ts';
import { Figure, NeededFigure, Words } from './form-fields.tsx';
import { FormFindings, FormPane, findingsFor } from './form-pane.tsx';
import { HeadBoundaries } from './head-boundaries.tsx';
import { headwaterQuestion } from './headwater-question.ts';
import { LevelDoubtFields } from './level-doubt-fields.tsx';

type WaterLevels = EntityOf<'waterLevels'>;

interface WaterFormProps extends DeskFormProps {
  fullSupplyLevel: number | null;
  onTrace: (boundary: BoundaryKind) => void;
  onOpenLine: (id: string) => void;
}

/** Water levels of the load case, and the boundaries that carry them. */
export function WaterForm({ fullSupplyLevel, onTrace, onOpenLine, ...form }: WaterFormProps) {
  const { document, reading, disabled, run } = form;
  const held = singleOf(document, 'waterLevels');
  if (!held) return null;
  const level = elevationUnit(document.unitSystem, document.datum);
  const { headwater, tailwater, gammaW, source } = held.value;
  const change = (changes: Partial<WaterLevels>) =>
    run(text.labels.levels, [{ op: 'put', entityId: held.id, value: { ...held.value, ...changes } }]);
  return (
    <FormPane title={text.title} onClose={form.onClose}>
      <FormFindings findings={findingsFor(reading?.findings, 'headwater', 'outlet')} />
      <Figure
        label={text.headwater(level)}
        value={headwater}
        optional
        disabled={disabled}
        question={headwaterQuestion(held.value, fullSupplyLevel, document)}
        onCommit={(next) => change({ headwater: next })}
      />
      {headwater === null && fullSupplyLevel !== null && !disabled ? (
        <div>
          <Button look="quiet" onClick={() => change({ headwater: fullSupplyLevel })}>
            {text.takeFullSupply(`${fixedText(fullSupplyLevel, 2)} ${level}`)}
          </Button>
        </div>
      ) : null}
      <Figure
        label={text.tailwater(level)}
        hint={text.tailwaterHint}
        value={tailwater}
        optional
        disabled={disabled}
        onCommit={(next) => change({ tailwater: next })}
      />
      <HeadBoundaries
        lines={entitiesOf(document, 'line')}
        unit={level}
        disabled={disabled}
        onTrace={onTrace}
        onOpenLine={onOpenLine}
      />
      <NeededFigure
        label={text.gammaW(unitNames(document.unitSystem).unitWeight)}
        value={gammaW}
        positive
        disabled={disabled}
        onCommit={(next) => change({ gammaW: next })}
      />
      <LevelDoubtFields
        levels={held.value}
        unitSystem={document.unitSystem}
        disabled={disabled}
        change={change}
      />
      <Words
        label={formText.source}
        hint={formText.sourceHint}
        value={source}
        maxLength={500}
        disabled={disabled}
        onCommit={(next) => change({ source: next })}
      />
    </FormPane>
  );
}

import { Button } from '#client/components/button.tsx';
import { plainText } from '#client/lib/figures.ts';
import { soilText, countText as text } from '#client/text/desk-forms.ts';
import { type EntityOf, entitiesOf, singleOf } from '#shared/contract/document.ts';
import type { DeskFormProps } from './desk-form.ts';
import { Choice, Figure, NeededFigure } from './form-fields.tsx';
import { FormFindings, FormPane, findingsFor } from './form-pane.tsx';

/** What the engineer counted on the drawing, beside what the traced lines amount to. */
export function CountForm({ document, reading, disabled, run, onClose }: DeskFormProps) {
  const held = singleOf(document, 'netCount');
  if (!held) return null;
  const { drops, channels, cellRatio, tracingAccuracyPx, knownPointAccuracyPx } = held.value;
  const change = (changes: Partial<EntityOf<'netCount'>>) =>
    run(text.label, [{ op: 'put', entityId: held.id, value: { ...held.value, ...changes } }]);
  const traced = reading?.quantities.tracedDrops ?? null;
  const findings = findingsFor(reading?.findings, 'drops', 'channels', 'headPerDrop');
  return (
    <FormPane title={text.title} onClose={onClose}>
      <FormFindings findings={findings} />
      <Figure
        label={text.drops}
        hint={text.dropsHint}
        value={drops}
        optional
        positive
        disabled={disabled}
        onCommit={(next) => change({ drops: next })}
      />
      <div className="flex flex-wrap items-center gap-2">
        <span className="text-ink-2">
          {traced === null ? text.tracedNone : text.traced(plainText(traced))}
        </span>
        {traced !== null && traced !== drops && !disabled ? (
          <Button look="quiet" onClick={() => change({ drops: traced })}>
            {text.takeTraced(plainText(traced))}
          </Button>
        ) : null}
      </div>
      <Figure
        label={text.channels}
        hint={text.channelsHint}
        value={channels}
        optional
        positive
        disabled={disabled}
        onCommit={(next) => change({ channels: next })}
      />
      <NeededFigure
        label={text.cellRatio}
        hint={text.cellRatioHint}
        value={cellRatio}
        positive
        disabled={disabled}
        onCommit={(next) => change({ cellRatio: next })}
      />
      <CountedIn document={document} countedIn={held.value.countedIn} disabled={disabled} change={change} />
      <NeededFigure
        label={text.tracing}
        value={tracingAccuracyPx}
        atLeast={{ least: 0, fault: text.accuracyTooSmall }}
        disabled={disabled}
        onCommit={(next) => change({ tracingAccuracyPx: next })}
      />
      <NeededFigure
        label={text.knownPoints}
        hint={text.accuracyHint}
        value={knownPointAccuracyPx}
        atLeast={{ least: 0, fault: text.accuracyTooSmall }}
        disabled={disabled}
        onCommit={(next) => change({ knownPointAccuracyPx: next })}
      />
    </FormPane>
  );
}

/** The soil in which the channels are counted; asked for only where there are several. */
function CountedIn({
  document,
  countedIn,
  disabled,
  change,
}: Pick<DeskFormProps, 'document' | 'disabled'> & {
  countedIn: string | null;
  change: (changes: Partial<EntityOf<'netCount'>>) => void;
}) {
  const soils = entitiesOf(document, 'soil');
  if (soils.length === 0 && countedIn === null) return null;
  const names = Object.fromEntries([
    ['', text.sectionSoil],
    ...soils.map(({ id, value }) => [id, value.name || soilText.unnamed]),
  ]);
  return (
    <Choice
      label={text.countedIn}
      hint={text.countedInHint}
      value={countedIn ?? ''}
      names={names}
      disabled={disabled}
      onCommit={(id) => change({ countedIn: id === '' ? null : id })}
    />
  );
}

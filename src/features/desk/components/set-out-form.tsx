import { Button } from '#client/components/button.tsx';
import { fixedText, plainText, signedText } from '#client/lib/figures.ts';
import { setOutText as text } from '#client/text/desk-forms.ts';
import { type EntityOf, entitiesOf, singleOf } from '#shared/contract/document.ts';
import type { SetOutReading } from '#shared/contract/reading.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import type { DeskFormProps } from './desk-form.ts';
import { Choice, Figure } from './form-fields.tsx';
import { FormFindings, FormPane, findingsFor } from './form-pane.tsx';
import { KnownPointRows } from './known-point-rows.tsx';

type SetOut = EntityOf<'setOut'>;

/** How the section is set out: its known points, what they mean, and how well they agree. */
export function SetOutForm({
  placedId,
  onPlace,
  ...form
}: DeskFormProps & {
  placedId: string | null;
  /** Takes up the tool that places known points. */
  onPlace: () => void;
}) {
  const { document, reading, disabled, run } = form;
  const held = singleOf(document, 'setOut');
  const points = entitiesOf(document, 'knownPoint');
  if (!held) return null;
  const change = (changes: Partial<SetOut>, label: string = text.labels.setOut) =>
    run(label, [{ op: 'put', entityId: held.id, value: { ...held.value, ...changes } }]);
  return (
    <FormPane title={text.title} onClose={form.onClose}>
      <p className="m-0 text-ink-2">{text.lead}</p>
      <FormFindings findings={findingsFor(reading?.findings, 'scale', 'residual')} />
      {disabled ? null : (
        <div>
          <Button onClick={onPlace}>{text.place}</Button>
        </div>
      )}
      <Choice
        label={text.method}
        value={held.value.method}
        names={text.methods}
        disabled={disabled}
        onCommit={(method) => change({ method }, text.labels.method)}
      />
      <KnownPointRows points={points} placedId={placedId} {...form} />
      {held.value.method === 'distance' ? (
        <DistanceFields {...form} setOut={held.value} change={change} />
      ) : null}
      <Sides setOut={held.value} reading={reading?.setOut ?? null} disabled={disabled} change={change} />
      <Figure
        label={text.statedScale}
        hint={text.statedScaleHint}
        value={held.value.statedScale}
        optional
        positive
        disabled={disabled}
        onCommit={(statedScale) => change({ statedScale })}
      />
      <Choice
        label={text.scales}
        hint={text.scalesHint[held.value.scales]}
        value={held.value.scales}
        names={text.scalesNames}
        disabled={disabled}
        onCommit={(scales) => change({ scales })}
      />
      {reading?.setOut.state === 'fitted' ? (
        <Fit
          setOut={reading.setOut}
          stated={held.value.statedScale !== null}
          unit={unitNames(document.unitSystem).length}
        />
      ) : null}
    </FormPane>
  );
}

interface PartProps {
  setOut: SetOut;
  disabled: boolean;
  change: (changes: Partial<SetOut>) => void;
}

function DistanceFields({ document, setOut, disabled, change }: PartProps & Pick<DeskFormProps, 'document'>) {
  return (
    <>
      <Figure
        label={text.distance(unitNames(document.unitSystem).length)}
        hint={text.distanceHint}
        value={setOut.distance}
        optional
        positive
        disabled={disabled}
        onCommit={(distance) => change({ distance })}
      />
      <Choice
        label={text.level}
        value={setOut.level}
        names={text.levels}
        disabled={disabled}
        onCommit={(level) => change({ level })}
      />
    </>
  );
}

const TURNS = { '': null, 0: 0, 1: 1, 2: 2, 3: 3 } as const;

function Sides({ setOut, reading, disabled, change }: PartProps & { reading: SetOutReading | null }) {
  // Which way is up is asked only when the points leave it open.
  const askUp = setOut.upQuarterTurns !== null || reading?.state === 'ambiguous';
  return (
    <>
      <Choice
        label={text.upstream}
        value={setOut.upstream ?? ''}
        names={text.upstreams}
        disabled={disabled}
        onCommit={(side) => change({ upstream: side === '' ? null : side })}
      />
      <Choice
        label={text.grow}
        value={setOut.offsetsGrow ?? ''}
        names={text.grows}
        disabled={disabled}
        onCommit={(side) => change({ offsetsGrow: side === '' ? null : side })}
      />
      {askUp ? (
        <Choice
          label={text.up}
          value={turnName(setOut.upQuarterTurns)}
          names={text.ups}
          disabled={disabled}
          onCommit={(turns) => change({ upQuarterTurns: TURNS[turns] })}
        />
      ) : null}
    </>
  );
}

function turnName(turns: SetOut['upQuarterTurns']): '' | '0' | '1' | '2' | '3' {
  return turns === null ? '' : (`${turns}` as const);
}

function Fit({ setOut, stated, unit }: { setOut: SetOutReading; stated: boolean; unit: string }) {
  const implied = setOut.impliedScale === null ? '' : `, ${text.implied(plainText(setOut.impliedScale, 3))}`;
  return (
    <section className="border-t border-rule pt-2">
      <h3 className="m-0 text-sm font-semibold">{text.result}</h3>
      <p className="m-0">
        {text.scale(`${plainText(setOut.unitsPerPx, 4)} ${unit}/px`)}
        {implied}.
      </p>
      {stated && setOut.impliedScale === null ? (
        <p className="m-0 text-attention">{text.noResolution}</p>
      ) : null}
      <p className="m-0">{text.rotation(signedText(setOut.rotationDeg, 2))}.</p>
      <p className="m-0">
        {setOut.residual === null
          ? text.residualNone
          : `${text.residualAll(`${fixedText(setOut.residual, 3)} ${unit}`)}.`}
      </p>
    </section>
  );
}

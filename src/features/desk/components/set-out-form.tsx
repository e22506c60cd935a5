import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { CheckField } from '#client/components/field.tsx';
import { plainText, signedText } from '#client/lib/figures.ts';
import { setOutText as text } from '#client/text/desk-forms.ts';
import { placingText as placing } from '#client/text/set-out.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { lengthEnds } from '#shared/compute/set-out-distance.ts';
import { scaleBarOf } from '#shared/compute/set-out-findings.ts';
import { type EntityOf, entitiesOf, singleOf } from '#shared/contract/document.ts';
import type { NetReading, SetOutReading } from '#shared/contract/reading.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { changeSettingOutAids, settingOutAids } from '../model/setting-out-aids.ts';
import type { DeskFormProps } from './desk-form.ts';
import { Choice, Figure } from './form-fields.tsx';
import { FormFindings, FormPane, findingsFor } from './form-pane.tsx';
import { KnownPointRows } from './known-point-rows.tsx';
import { SetOutFit } from './set-out-fit.tsx';

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
          <TakesCrossings />
        </div>
      )}
      <Choice
        label={text.method}
        value={held.value.method}
        names={text.methods}
        disabled={disabled}
        onCommit={(method) => change({ method }, text.labels.method)}
      />
      <KnownPointRows
        points={points}
        placedId={placedId}
        method={held.value.method}
        barEnds={held.value.method === 'points' && held.value.distance !== null ? blankPair(points) : []}
        {...form}
      />
      {held.value.method === 'distance' ? (
        <DistanceFields {...form} setOut={held.value} change={change} />
      ) : (
        <ScaleBar {...form} setOut={held.value} points={points} change={change} />
      )}
      {asksLevel(held.value, reading) ? (
        <Choice
          label={text.level}
          value={held.value.level}
          names={placing.levelsOfPoints}
          disabled={disabled}
          onCommit={(level) => change({ level })}
        />
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
      {reading?.setOut.state === 'fitted' ? <SetOutFit document={document} setOut={reading.setOut} /> : null}
    </FormPane>
  );
}

function TakesCrossings() {
  const on = useStore(settingOutAids, (state) => state.takesCrossings);
  return (
    <div className="mt-2">
      <CheckField
        label={placing.takesCrossings}
        hint={placing.takesCrossingsHint}
        checked={on}
        onChange={(event) => changeSettingOutAids({ takesCrossings: event.target.checked })}
      />
    </div>
  );
}

interface PartProps {
  setOut: SetOut;
  disabled: boolean;
  change: (changes: Partial<SetOut>) => void;
}

type PointsProps = PartProps & Pick<DeskFormProps, 'document'>;

function DistanceFields({ document, setOut, disabled, change }: PointsProps) {
  const unit = unitNames(document.unitSystem).length;
  const ends = lengthEnds(entitiesOf(document, 'knownPoint'));
  return (
    <>
      <Figure
        label={ends === null ? text.distance(unit) : placing.endsOf(nameOf(ends[0]), nameOf(ends[1]), unit)}
        hint={ends === null ? placing.endsUnmarked : text.distanceHint}
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

type KnownPoint = { id: string; value: EntityOf<'knownPoint'> };
const nameOf = ({ value }: KnownPoint) => value.name || text.unnamed;

/** Two points that give neither offset nor elevation may be the ends of a scale bar. */
function blankPair(points: readonly KnownPoint[]): string[] {
  const blank = points.filter(({ value }) => value.offset === null && value.elevation === null);
  return blank.length < 2 ? [] : blank.slice(0, 2).map(({ id }) => id);
}

/** A scale bar beside known points checks the fit; it is offered once two points could be its ends. */
function ScaleBar({
  document,
  setOut,
  disabled,
  change,
  points,
}: PointsProps & { points: readonly KnownPoint[] }) {
  const [from, to] = blankPair(points).map((id) => points.find((point) => point.id === id));
  if (from === undefined || to === undefined) return null;
  const { map } = readSetOut(document);
  const bar = map === null ? null : scaleBarOf(document, setOut, map);
  const unit = unitNames(document.unitSystem).length;
  return (
    <Figure
      label={placing.scaleBar(unit)}
      hint={
        bar === null
          ? placing.scaleBarHint(nameOf(from), nameOf(to))
          : placing.scaleBarFits(
              `${plainText(bar.fitted, 5)} ${unit}`,
              signedText(100 * (bar.fitted / bar.stated - 1), 2),
            )
      }
      value={setOut.distance}
      optional
      positive
      disabled={disabled}
      onCommit={(distance) => change({ distance })}
    />
  );
}

/** Asked when the points leave the turn of the sheet open, and shown as long as it is answered. */
function asksLevel({ method, level }: SetOut, reading: NetReading | null): boolean {
  if (method !== 'points') return false;
  return level === 'sheet' || (reading?.findings.some(({ code }) => code === 'turnUnknown') ?? false);
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

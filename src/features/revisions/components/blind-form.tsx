import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { NumberField } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { fixedText, plainText } from '#client/lib/figures.ts';
import { blindText as text } from '#client/text/check-work.ts';
import { commonText } from '#client/text/common.ts';
import type { BlindView } from '#shared/contract/review.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import { useSealBlindReading, useShowPlaces } from '../api/blind-queries.ts';
import { BlindPoint } from './blind-point.tsx';
import { readTyped, type TypedPoint, type TypedReading } from './blind-typed.ts';
import { OpenFigures } from './open-figures.tsx';

interface BlindFormProps {
  view: BlindView;
  typed: TypedReading;
  onType: (typed: TypedReading) => void;
  /** Point whose place the next press on the sheet gives. */
  placing: string | null;
  onPlace: (pointId: string | null) => void;
  onSealed: () => void;
}

/** Reading points on the net alone: what is given, what is read, and the ways to the figures. */
export function BlindForm({ view, typed, onType, placing, onPlace, onSealed }: BlindFormProps) {
  const seal = useSealBlindReading(view.revisionId);
  const [fault, setFault] = useState<string | null>(null);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (seal.isPending) return;
    const read = readTyped(typed, view);
    setFault(read.fault ?? null);
    if (read.input) seal.mutate(read.input, { onSuccess: onSealed });
  };
  const setPoint = (id: string, point: TypedPoint | null) => {
    const { [id]: _, ...others } = typed.points;
    onType({ ...typed, points: point === null ? others : { ...others, [id]: point } });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-2 px-3 py-2" noValidate>
      <h2 className="m-0 text-base font-bold">{text.title(view.label)}</h2>
      <p className="m-0 text-ink-2">{text.lead}</p>
      {view.asked ? <p className="m-0 font-semibold">{text.asked(view.sentBy.name)}</p> : null}
      <p className="m-0 text-ink-2">{view.figuresMailed ? text.mailed : text.notMailed}</p>
      <Given view={view} />
      <NumberField
        label={text.drops}
        hint={text.dropsHint}
        value={typed.drops}
        onChange={(event) => onType({ ...typed, drops: event.target.value })}
      />
      <NumberField
        label={text.outletHead}
        unit={elevationUnit(view.document.unitSystem, view.document.datum)}
        value={typed.outletHead}
        onChange={(event) => onType({ ...typed, outletHead: event.target.value })}
      />
      <h3 className="m-0 mt-1 text-sm font-semibold">{text.points}</h3>
      <p className="m-0 text-ink-2">{view.points.length > 0 ? text.pointsLead : text.noPoints}</p>
      {view.points.length > 0 ? <Places view={view} /> : null}
      <ul className="m-0 list-none border-t border-rule p-0">
        {view.points.map((point) => (
          <BlindPoint
            key={point.id}
            view={view}
            point={point}
            typed={typed}
            onChange={(next) => setPoint(point.id, next)}
            isPlacing={placing === point.id}
            onPlace={() => onPlace(placing === point.id ? null : point.id)}
          />
        ))}
      </ul>
      <p className="m-0 text-sm text-ink-2">
        {text.sealLead} {text.kept}
      </p>
      {fault ? (
        <p role="alert" className="m-0 text-wrong">
          {fault}
        </p>
      ) : null}
      <ProblemNote error={seal.error} />
      <div className="flex flex-wrap gap-2">
        <Button
          type="submit"
          look="main"
          disabled={view.points.length === 0}
          busy={seal.isPending}
          busyLabel={commonText.sending}
        >
          {text.seal}
        </Button>
        <OpenFigures revisionId={view.revisionId} />
      </div>
    </form>
  );
}

function Given({ view: { levels, document } }: { view: BlindView }) {
  const { unitSystem, datum } = document;
  const level = (value: number | null, none: string) =>
    value === null
      ? none
      : `${fixedText(value, DECIMALS[unitSystem].elevation)} ${elevationUnit(unitSystem, datum)}`;
  const rows = [
    [text.headwater, level(levels.headwater, text.notGiven)],
    [text.tailwater, level(levels.tailwater, text.noTailwater)],
    [text.gammaW, `${plainText(levels.gammaW)} ${unitNames(unitSystem).unitWeight}`],
  ] as const;
  return (
    <dl aria-label={text.given} className="m-0 grid grid-cols-[1fr_auto] gap-x-2 border-y border-rule py-1">
      {rows.map(([label, value]) => (
        <div key={label} className="contents">
          <dt className="text-ink-2">{label}</dt>
          <dd className="m-0 text-right tabular-nums">{value}</dd>
        </div>
      ))}
    </dl>
  );
}

function Places({ view }: { view: BlindView }) {
  const show = useShowPlaces(view.revisionId);
  if (view.placesShown) return <p className="m-0 text-ink-2">{text.placesShown}</p>;
  return (
    <div>
      <Button look="quiet" busy={show.isPending} onClick={() => show.mutate()}>
        {text.showPlaces}
      </Button>
      <p className="m-0 mt-1 text-sm text-ink-2">{text.showPlacesHint}</p>
      <ProblemNote error={show.error} />
    </div>
  );
}

import { Button } from '#client/components/button.tsx';
import { inputClass } from '#client/components/field.tsx';
import { fixedText } from '#client/lib/figures.ts';
import { blindText as text } from '#client/text/check-work.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';
import type { BlindView } from '#shared/contract/review.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import { figuresTyped, NEW_POINT, type TypedPoint, type TypedReading } from './blind-typed.ts';

interface BlindPointProps {
  view: BlindView;
  point: BlindView['points'][number];
  typed: TypedReading;
  onChange: (point: TypedPoint | null) => void;
  isPlacing: boolean;
  onPlace: () => void;
}

/** One of the engineer's points, read or left out: its place, what is read there, and the pressure that follows. */
export function BlindPoint({ view, point, typed, onChange, isPlacing, onPlace }: BlindPointProps) {
  const held = typed.points[point.id];
  const name = point.name || text.unnamed;
  const { unitSystem, datum } = view.document;
  const { length } = unitNames(unitSystem);
  const level = elevationUnit(unitSystem, datum);
  const set = (change: Partial<TypedPoint>) => onChange({ ...(held ?? NEW_POINT), ...change });
  return (
    <li className="border-b border-rule-2 py-1.5">
      <div className="flex flex-wrap items-center gap-2">
        <label className="touch flex min-w-0 flex-1 items-center gap-2 font-semibold">
          <input
            type="checkbox"
            aria-label={text.read(name)}
            className="size-4 shrink-0 accent-ink pointer-coarse:size-6"
            checked={held !== undefined}
            onChange={(event) => onChange(event.target.checked ? NEW_POINT : null)}
          />
          <span className="min-w-0 break-words">{name}</span>
        </label>
        {held ? (
          <Button
            look={isPlacing ? 'plain' : 'quiet'}
            aria-label={text.placeOf(name)}
            aria-pressed={isPlacing}
            className="px-2 py-[2px] text-sm"
            onClick={onPlace}
          >
            {held.sheetAt ? text.placeAgain : text.place}
          </Button>
        ) : null}
      </div>
      {held ? (
        <>
          <div className="mt-1 grid grid-cols-2 gap-x-2 gap-y-1">
            <Figure
              name={name}
              label={text.fields.elevation}
              unit={level}
              value={held.elevation}
              // A typed place is not the one that was pressed.
              onType={(elevation) => set({ elevation, sheetAt: null })}
            />
            <Figure
              name={name}
              label={text.fields.offset}
              unit={length}
              value={held.offset}
              onType={(offset) => set({ offset, sheetAt: null })}
            />
            <Figure
              name={name}
              label={text.fields.drops}
              unit=""
              value={held.drops}
              onType={(drops) => set({ drops })}
            />
            <Figure
              name={name}
              label={text.fields.head}
              unit={level}
              value={held.head}
              onType={(head) => set({ head })}
            />
          </div>
          <input
            className={`${inputClass(false)} mt-1`}
            aria-label={text.fieldOf(text.fields.remark, name)}
            placeholder={text.fields.remark}
            maxLength={MAX_NOTE_LENGTH}
            value={held.remark}
            onChange={(event) => set({ remark: event.target.value })}
          />
          <Follows view={view} point={held} typed={typed} />
        </>
      ) : null}
    </li>
  );
}

interface FigureProps {
  name: string;
  label: string;
  unit: string;
  value: string;
  onType: (typed: string) => void;
}

function Figure({ name, label, unit, value, onType }: FigureProps) {
  return (
    <label className="flex min-w-0 flex-col text-sm text-ink-2">
      {unit ? `${label}, ${unit}` : label}
      <input
        className={`${inputClass(false)} text-right text-ink`}
        aria-label={text.fieldOf(label, name)}
        inputMode="text"
        autoComplete="off"
        value={value}
        onChange={(event) => onType(event.target.value)}
      />
    </label>
  );
}

/** The head and the pressure by the hand rule, as they will be sealed. */
function Follows({ view, point, typed }: { view: BlindView; point: TypedPoint; typed: TypedReading }) {
  const figures = figuresTyped(point, typed, view.levels);
  const { unitSystem, datum } = view.document;
  const decimals = DECIMALS[unitSystem];
  if (figures === null) return <p className="m-0 mt-1 text-sm text-ink-2">{text.givesNothing}</p>;
  const head = `${fixedText(figures.totalHead, decimals.head)} ${elevationUnit(unitSystem, datum)}`;
  const pressure = `${fixedText(figures.porePressure, decimals.pressure)} ${unitNames(unitSystem).pressure}`;
  return (
    <output className="mt-1 block text-right tabular-nums">
      {text.gives(head, pressure)}
      {figures.isAbove ? `, ${text.above}` : ''}
    </output>
  );
}

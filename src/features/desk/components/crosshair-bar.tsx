import {
  type FormEvent,
  type KeyboardEvent,
  type RefObject,
  useEffect,
  useMemo,
  useRef,
  useState,
} from 'react';
import { useStore } from 'zustand';
import { fixedText } from '#client/lib/figures.ts';
import { numberFault } from '#client/lib/number-fault.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { crosshairText as text } from '#client/text/keys.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { CrosshairStore } from '../model/crosshair.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { SheetSize } from '../model/viewport.ts';
import { figuresOf, placeOfFigures } from './vertex-rows.ts';

interface CrosshairBarProps {
  store: DeskStore;
  crosshair: CrosshairStore;
  sheet: SheetSize;
  /** Gives the keys back to the sheet. */
  onLeave: () => void;
}

/** While the crosshair is shown: its place, which can be typed, and what its keys do now. */
export function CrosshairBar(props: CrosshairBarProps) {
  const { store, crosshair } = props;
  const at = useStore(crosshair, (state) => state.at);
  const holds = useStore(crosshair, (state) => state.holds);
  const first = useRef<HTMLInputElement>(null);
  useEffect(
    () =>
      store.onIntent((intent) => {
        // Where it is not shown yet its field comes with it.
        if (intent.type === 'crosshair' && intent.wants === 'place')
          requestAnimationFrame(() => first.current?.focus());
      }),
    [store],
  );
  return (
    <>
      <span role="status" className="sr-only">
        {at === null ? '' : holds ? text.holds : text.shown}
      </span>
      {at === null ? null : (
        <div
          data-over-sheet
          className="flex max-w-full flex-col gap-1 rounded-sheet border border-ink bg-film px-2.5 py-1.5"
        >
          <PlaceForm {...props} at={at} first={first} />
          <p className="m-0 text-sm text-ink-2">{holds ? text.holdHint : text.hint}</p>
        </div>
      )}
    </>
  );
}

const INPUT =
  'w-24 rounded-sheet border border-edge bg-white px-1.5 py-0.5 text-right tabular-nums placeholder:text-ink-2';

/** A place by its figures: of the section once it is set out, else pixels of the sheet. An empty one stays as it is. */
function PlaceForm({
  store,
  crosshair,
  sheet,
  onLeave,
  at,
  first,
}: CrosshairBarProps & { at: SheetPx; first: RefObject<HTMLInputElement | null> }) {
  const document = useStore(store, (state) => state.document);
  const map = useMemo(() => readSetOut(document).map, [document]);
  const [typed, setTyped] = useState<readonly [string, string]>(['', '']);
  const [fault, setFault] = useState<string | null>(null);
  const now = figuresOf([at[0], at[1]], 'section', map);
  const labels =
    map === null
      ? [text.x, text.y]
      : [
          text.offset(unitNames(document.unitSystem).length),
          text.elevation(elevationUnit(document.unitSystem, document.datum)),
        ];

  function go(event: FormEvent) {
    event.preventDefault();
    if (typed.every((each) => each.trim() === '')) return setFault(text.oneNeeded);
    const wrong = typed.find((each) => each.trim() !== '' && parseTypedNumber(each) === null);
    if (wrong !== undefined) return setFault(numberFault(wrong));
    const figures = typed.map((each, axis) => parseTypedNumber(each) ?? now[axis as 0 | 1]);
    const place = placeOfFigures([figures[0]!, figures[1]!], map);
    if (!isOn(place, sheet)) return setFault(text.offSheet);
    crosshair.setState({ at: place, last: place, exact: true });
    setTyped(['', '']);
    setFault(null);
    onLeave();
  }

  function leave(event: KeyboardEvent): void {
    if (event.key !== 'Escape') return;
    event.preventDefault();
    setFault(null);
    onLeave();
  }

  return (
    <form
      noValidate
      aria-label={text.title}
      className="flex flex-wrap items-center gap-x-2 gap-y-1"
      onSubmit={go}
    >
      {([0, 1] as const).map((axis) => (
        <label key={axis} className="flex items-center gap-1.5 text-sm">
          {labels[axis]}
          <input
            ref={axis === 0 ? first : undefined}
            type="text"
            autoComplete="off"
            spellCheck={false}
            placeholder={fixedText(now[axis], map === null ? 1 : 2)}
            aria-invalid={fault === null ? undefined : true}
            className={INPUT}
            value={typed[axis]}
            onKeyDown={leave}
            onChange={({ target: { value } }) => setTyped(axis === 0 ? [value, typed[1]] : [typed[0], value])}
          />
        </label>
      ))}
      <button type="submit" className="touch rounded-sheet border border-edge px-2 py-0.5 hover:bg-hover">
        {text.go}
      </button>
      <button
        type="button"
        className="touch underline"
        onClick={() => {
          crosshair.setState({ at: null });
          onLeave();
        }}
      >
        {text.putAway}
      </button>
      {fault === null ? null : (
        <p role="alert" className="m-0 basis-full text-sm text-wrong">
          {fault}
        </p>
      )}
    </form>
  );
}

/** A section may reach a little beyond the scan; far off it nothing is drawn. */
function isOn([x, y]: SheetPx, { widthPx, heightPx }: SheetSize): boolean {
  const [right, bottom] = [1.5 * widthPx, 1.5 * heightPx];
  return x > -widthPx / 2 && y > -heightPx / 2 && x < right && y < bottom;
}

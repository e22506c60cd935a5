import { useStore } from 'zustand';
import { classNames } from '#client/components/class-names.ts';
import { sheetAidsText as text } from '#client/text/tracing-aids.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { FADE_STEP_PCT, LINE_WEIGHTS, MOST_FADE_PCT } from '../model/view-aids.ts';
import { AidHint, AidTitle } from './aid-words.tsx';

/** How the sheet looks on this screen: weight of the lines, fade and invert of the scan, figures at the pointer. */
export function ViewLook({ store }: { store: DeskStore }) {
  const { lineWeight, fadePct, inverted, liveHelp } = useStore(store, (state) => state.aids);
  const readOnly = useStore(store, (state) => state.readOnly);
  return (
    <>
      <AidTitle>{text.viewTitle}</AidTitle>
      <fieldset className="m-0 flex items-center border-0 p-0">
        <legend className="float-left mr-3 p-0">{text.weight}</legend>
        <span className="ml-auto flex rounded-sheet border border-edge">
          {LINE_WEIGHTS.map((weight, i) => (
            <button
              key={weight}
              type="button"
              aria-pressed={weight === lineWeight}
              className={classNames(
                'touch border-0 px-2 py-0.5 hover:bg-hover',
                i > 0 && 'border-l border-rule',
                weight === lineWeight ? 'bg-chosen font-semibold' : 'bg-transparent',
              )}
              onClick={() => store.setAids({ lineWeight: weight })}
            >
              {text.weights[weight]}
            </button>
          ))}
        </span>
      </fieldset>
      <label className="touch mt-2 flex items-center gap-2.5">
        <span className="whitespace-nowrap">{text.fade}</span>
        <input
          type="range"
          className="min-w-0 flex-1 accent-equipotential"
          min={0}
          max={MOST_FADE_PCT}
          step={FADE_STEP_PCT}
          value={fadePct}
          aria-valuetext={text.fadeShown(fadePct)}
          onChange={(event) => store.setAids({ fadePct: event.target.valueAsNumber })}
        />
        <span aria-hidden="true" className="w-10 text-right">
          {text.fadeShown(fadePct)}
        </span>
      </label>
      <Switch label={text.invert} checked={inverted} onChange={(on) => store.setAids({ inverted: on })} />
      {readOnly ? null : (
        <>
          <Switch
            label={text.liveHelp}
            checked={liveHelp}
            onChange={(on) => store.setAids({ liveHelp: on })}
          />
          <p className="mt-0 mb-0 ml-6 text-sm text-ink-2">{text.liveHelpHint}</p>
        </>
      )}
      <AidHint>{text.viewHint}</AidHint>
    </>
  );
}

type SwitchProps = { label: string; checked: boolean; onChange(checked: boolean): void };

function Switch({ label, checked, onChange }: SwitchProps) {
  return (
    <label className="touch mt-1.5 flex pointer-fine:min-h-6 items-center gap-2.5">
      <input
        type="checkbox"
        className="accent-equipotential"
        checked={checked}
        onChange={(event) => onChange(event.target.checked)}
      />
      {label}
    </label>
  );
}

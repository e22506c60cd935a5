import { useState } from 'react';
import { CheckField, Field, NumberField } from '#client/components/field.tsx';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { cleanUpText as text } from '#client/text/clean-up.ts';
import { MAX_SPECK_PX } from '#shared/contract/limits.ts';
import type { RenditionSettings } from '#shared/contract/renditions.ts';

const USUAL_THRESHOLD = 160;

type ToneFieldsProps = {
  settings: RenditionSettings;
  onChange: (change: Partial<RenditionSettings>) => void;
};

/** Paper, contrast, threshold, inversion and specks. */
export function ToneFields({ settings, onChange }: ToneFieldsProps) {
  const { black, white, threshold } = settings;
  return (
    <fieldset className="m-0 flex flex-col gap-3 border-0 p-0">
      <legend className="mb-2 text-md font-bold">{text.tones}</legend>
      <CheckField
        label={text.whiten}
        checked={settings.whitenPaper}
        onChange={(event) => onChange({ whitenPaper: event.target.checked })}
      />
      <Slider
        label={text.black}
        value={black}
        from={0}
        to={254}
        onChange={(value) => onChange({ black: Math.min(value, white - 1) })}
      />
      <Slider
        label={text.white}
        value={white}
        from={1}
        to={255}
        onChange={(value) => onChange({ white: Math.max(value, black + 1) })}
      />
      <CheckField
        label={text.blackAndWhite}
        checked={threshold !== null}
        onChange={(event) => onChange({ threshold: event.target.checked ? USUAL_THRESHOLD : null })}
      />
      {threshold === null ? null : (
        <Slider
          label={text.threshold}
          value={threshold}
          from={1}
          to={254}
          onChange={(value) => onChange({ threshold: value })}
        />
      )}
      <CheckField
        label={text.invert}
        checked={settings.invert}
        onChange={(event) => onChange({ invert: event.target.checked })}
      />
      <SpecksField
        key={settings.specksPx}
        value={settings.specksPx}
        onChange={(specksPx) => onChange({ specksPx })}
      />
    </fieldset>
  );
}

type SliderProps = {
  label: string;
  value: number;
  from: number;
  to: number;
  onChange: (value: number) => void;
};

function Slider({ label, value, from, to, onChange }: SliderProps) {
  return (
    <Field label={label}>
      {(wiring) => (
        <>
          <input
            type="range"
            min={from}
            max={to}
            value={value}
            className="touch w-full min-w-0 accent-ink"
            onChange={(event) => onChange(Number(event.target.value))}
            {...wiring}
          />
          <output className="w-10 shrink-0 text-right">{value}</output>
        </>
      )}
    </Field>
  );
}

function SpecksField({ value, onChange }: { value: number; onChange: (value: number) => void }) {
  const [typed, setTyped] = useState(String(value));
  const parsed = parseTypedNumber(typed);
  const isRight = parsed !== null && Number.isInteger(parsed) && parsed >= 0 && parsed <= MAX_SPECK_PX;
  return (
    <NumberField
      label={text.specks}
      unit={text.specksUnit}
      hint={text.specksHint}
      error={isRight ? null : text.specksWrong(MAX_SPECK_PX)}
      value={typed}
      onChange={(event) => setTyped(event.target.value)}
      onBlur={() => isRight && parsed !== value && onChange(parsed)}
      onKeyDown={(event) => event.key === 'Enter' && isRight && onChange(parsed)}
    />
  );
}

import { useStore } from 'zustand';
import { SelectField } from '#client/components/field.tsx';
import { formatMoment } from '#client/lib/dates.ts';
import { fixedText } from '#client/lib/figures.ts';
import { browserLocale, chooseLocale, localeStore } from '#client/lib/locale.ts';
import { language } from '#client/text/language.ts';
import { localeText as text } from '#client/text/locale.ts';

/** Where the trade's people write; any other place has the signs of one of them. */
const OFFERED = [
  'en-GB',
  'en-US',
  'en-AU',
  'en-CA',
  'en-IN',
  'en-ZA',
  'cs-CZ',
  'da-DK',
  'de-AT',
  'de-CH',
  'de-DE',
  'es-CL',
  'es-ES',
  'es-MX',
  'fi-FI',
  'fr-CA',
  'fr-CH',
  'fr-FR',
  'it-CH',
  'it-IT',
  'ja-JP',
  'nb-NO',
  'nl-NL',
  'pl-PL',
  'pt-BR',
  'pt-PT',
  'sv-SE',
  'tr-TR',
  'zh-CN',
];
const EXAMPLE_LEVEL = 118.25;
const EXAMPLE_MOMENT = '2026-11-28T10:42:00';

/** How figures and dates are written at this screen; takes effect at once. */
export function LocaleForm() {
  const chosen = useStore(localeStore, (state) => state.chosen);
  // Shown anew with the choice, which the example follows.
  useStore(localeStore, (state) => state.tag);
  const names = new Intl.DisplayNames([language], { type: 'language' });
  const nameOf = (tag: string) => names.of(tag) ?? tag;
  const sorted = [...OFFERED].sort((a, b) => nameOf(a).localeCompare(nameOf(b), language));
  return (
    <div className="flex flex-col gap-3">
      <p className="m-0">{text.lead}</p>
      <SelectField
        label={text.field}
        hint={text.typing}
        value={chosen ?? ''}
        onChange={(event) => chooseLocale(event.target.value || null)}
      >
        <option value="">{text.asBrowser(nameOf(browserLocale()))}</option>
        {sorted.map((tag) => (
          <option key={tag} value={tag}>
            {nameOf(tag)}
          </option>
        ))}
      </SelectField>
      <p className="m-0">
        <span className="text-ink-2">{text.example}:</span> {fixedText(EXAMPLE_LEVEL, 2)} m,{' '}
        {formatMoment(EXAMPLE_MOMENT)}
      </p>
    </div>
  );
}

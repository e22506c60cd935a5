import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { NumberField } from '#client/components/field.tsx';
import { fixedText } from '#client/lib/figures.ts';
import { numberFault } from '#client/lib/number-fault.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { formText, soilText as text } from '#client/text/desk-forms.ts';
import { sectionPt } from '#shared/compute/frames.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { DeskFormProps } from './desk-form.ts';
import { addPlace, removePlace } from './soil-edits.ts';

interface SoilPlacesProps extends Pick<DeskFormProps, 'document' | 'reading' | 'disabled' | 'run'> {
  soilId: string;
  soil: EntityOf<'soil'>;
  /** Takes up the tool that marks places of this soil. */
  onPlace: () => void;
}

/** The places that say in which regions a soil lies: listed, removed, marked on the sheet or typed. */
export function SoilPlaces(props: SoilPlacesProps) {
  const { soil, reading, disabled, onPlace } = props;
  return (
    <section>
      <h3 className="m-0 text-sm font-semibold">{text.places}</h3>
      {soil.places.length === 0 ? (
        <p className="m-0 text-attention">{text.noPlaces}</p>
      ) : (
        <PlaceList {...props} />
      )}
      {disabled ? null : (
        <div className="mt-2">
          <Button onClick={onPlace}>{text.mark}</Button>
        </div>
      )}
      {disabled || reading?.setOut.state !== 'fitted' ? null : <TypedPlace {...props} />}
    </section>
  );
}

function PlaceList({ soilId, soil, disabled, run }: SoilPlacesProps) {
  return (
    <ol className="m-0 list-none p-0">
      {soil.places.map((place, index) => (
        <li key={place.join()} className="flex items-baseline gap-3 border-b border-rule-2 py-1">
          <span>{text.placeAt(index + 1, fixedText(place[0], 0), fixedText(place[1], 0))}</span>
          {disabled ? null : (
            <button
              type="button"
              aria-label={formText.removeNamed(text.placeName(index + 1))}
              className="touch ml-auto text-sm text-ink-2 underline"
              onClick={() => {
                const { label, ops } = removePlace(soilId, soil, place);
                run(label, ops);
              }}
            >
              {formText.remove}
            </button>
          )}
        </li>
      ))}
    </ol>
  );
}

const EMPTY = { offset: '', elevation: '' };

/** A place by its coordinates, for whoever works without a pointer. */
function TypedPlace({ soilId, soil, document, run }: SoilPlacesProps) {
  const [typed, setTyped] = useState(EMPTY);
  const [wrong, setWrong] = useState(false);
  const offset = parseTypedNumber(typed.offset);
  const elevation = parseTypedNumber(typed.elevation);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const { map } = readSetOut(document);
    setWrong(offset === null || elevation === null);
    if (offset === null || elevation === null || map === null) return;
    const [x, y] = map.toSheet(sectionPt(offset, elevation));
    const edit = addPlace(soilId, soil, [x, y]);
    if (edit) run(edit.label, edit.ops);
    setTyped(EMPTY);
  };
  const field = (name: keyof typeof EMPTY, label: string, value: number | null) => (
    <NumberField
      label={label}
      value={typed[name]}
      error={wrong && value === null ? numberFault(typed[name]) : null}
      onChange={(event) => setTyped({ ...typed, [name]: event.target.value })}
    />
  );
  return (
    <form className="mt-2" onSubmit={submit}>
      <p className="m-0 text-sm text-ink-2">{text.typed}</p>
      <div className="my-1 grid grid-cols-2 items-start gap-2">
        {field('offset', text.offset(unitNames(document.unitSystem).length), offset)}
        {field('elevation', text.elevation(elevationUnit(document.unitSystem, document.datum)), elevation)}
      </div>
      <Button type="submit">{text.addPlace}</Button>
    </form>
  );
}

import { Button } from '#client/components/button.tsx';
import { soilText as text } from '#client/text/desk-forms.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import type { DeskFormProps } from './desk-form.ts';
import { addSoil } from './soil-edits.ts';

interface SoilListProps extends Pick<DeskFormProps, 'document' | 'disabled' | 'run'> {
  newId: () => string;
  onOpenSoil: (soilId: string) => void;
}

/** The soils of their own, each a way to its form. */
export function SoilList({ document, disabled, run, newId, onOpenSoil }: SoilListProps) {
  const soils = entitiesOf(document, 'soil');
  const add = () => {
    const id = newId();
    const { label, ops } = addSoil(id, document);
    run(label, ops);
    onOpenSoil(id);
  };
  return (
    <section className="border-t border-rule pt-2">
      <h3 className="m-0 text-sm font-semibold">{text.listTitle}</h3>
      <p className="m-0 text-ink-2">{text.listLead}</p>
      {soils.length === 0 ? null : (
        <ul className="mx-0 my-2 list-none border-t border-rule-2 p-0">
          {soils.map(({ id, value }) => (
            <li key={id} className="border-b border-rule-2 py-1">
              <button
                type="button"
                className="touch font-semibold underline decoration-rule underline-offset-2"
                onClick={() => onOpenSoil(id)}
              >
                {value.name || text.unnamed}
              </button>
              <span className={`ml-2 ${value.places.length === 0 ? 'text-attention' : 'text-ink-2'}`}>
                {text.placeCount(value.places.length)}
              </span>
            </li>
          ))}
        </ul>
      )}
      {disabled ? null : (
        <div className="mt-2">
          <Button onClick={add}>{text.add}</Button>
        </div>
      )}
    </section>
  );
}

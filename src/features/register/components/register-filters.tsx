import { CheckField, SelectField } from '#client/components/field.tsx';
import { registerText as text } from '#client/text/register.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import { registerKind, registerSort, registerState } from '#shared/contract/register.ts';
import type { FilterName, RegisterFilters } from '../model/register-filters.ts';

interface FilterBarProps {
  filters: RegisterFilters;
  dams: ReadonlyArray<{ id: string; name: string }>;
  /** People of the dam chosen; none while no dam is. */
  people: readonly PersonRef[];
  onChange: (name: FilterName, value: string) => void;
}

/** What the register shows and in which order. */
export function FilterBar({ filters, dams, people, onChange }: FilterBarProps) {
  const choice = (name: FilterName) => ({
    value: filters[name] ?? '',
    onChange: (event: { target: { value: string } }) => onChange(name, event.target.value),
    className: 'min-w-0',
  });
  return (
    <div className="grid grid-cols-[repeat(auto-fit,minmax(150px,1fr))] items-end gap-x-3 gap-y-2.5">
      <SelectField label={text.dam} {...choice('dam')}>
        <option value="">{text.all}</option>
        {dams.map(({ id, name }) => (
          <option key={id} value={id}>
            {name}
          </option>
        ))}
      </SelectField>
      <SelectField label={text.kind} {...choice('kind')}>
        <option value="">{text.all}</option>
        {registerKind.options.map((kind) => (
          <option key={kind} value={kind}>
            {text.kindsOf(kind)}
          </option>
        ))}
      </SelectField>
      <SelectField label={text.state} {...choice('state')}>
        <option value="">{text.all}</option>
        {registerState.options.map((state) => (
          <option key={state} value={state}>
            {text.stateOf(state)}
          </option>
        ))}
      </SelectField>
      <SelectField label={text.whose} {...choice('whose')}>
        <option value="">{text.everybody}</option>
        <option value="me">{text.mine}</option>
        {people.map(({ id, name }) => (
          <option key={id} value={id}>
            {name}
          </option>
        ))}
      </SelectField>
      <SelectField
        label={text.sort}
        {...choice('sort')}
        value={filters.sort ?? 'number'}
        onChange={(event) => onChange('sort', event.target.value === 'number' ? '' : event.target.value)}
      >
        {registerSort.options.map((sort) => (
          <option key={sort} value={sort}>
            {text.sortOf(sort)}
          </option>
        ))}
      </SelectField>
      <CheckField
        label={text.putAway}
        checked={filters.archived === 'yes'}
        onChange={(event) => onChange('archived', event.target.checked ? 'yes' : '')}
      />
    </div>
  );
}

import { SelectField, TextField } from '#client/components/field.tsx';
import { activityText as text } from '#client/text/activity.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import { eventAbout } from '#shared/contract/events.ts';
import type { ActivityFilterName, ActivityFilters } from '../model/activity-filters.ts';

interface ActivityFilterBarProps {
  filters: ActivityFilters;
  people: readonly PersonRef[];
  onChange: (name: ActivityFilterName, value: string) => void;
}

/** Whose activity is shown, about what and of which days. */
export function ActivityFilterBar({ filters, people, onChange }: ActivityFilterBarProps) {
  const wiring = (name: ActivityFilterName) => ({
    value: filters[name] ?? '',
    onChange: (event: { target: { value: string } }) => onChange(name, event.target.value),
  });
  return (
    <div className="mb-4 grid max-w-[51.25rem] grid-cols-[repeat(auto-fit,minmax(9.375rem,1fr))] items-end gap-x-3 gap-y-2.5">
      <SelectField label={text.who} {...wiring('person')}>
        <option value="">{text.everybody}</option>
        {people.map(({ id, name }) => (
          <option key={id} value={id}>
            {name}
          </option>
        ))}
      </SelectField>
      <SelectField label={text.about} {...wiring('about')}>
        <option value="">{text.everything}</option>
        {eventAbout.options.map((about) => (
          <option key={about} value={about}>
            {text.abouts[about]}
          </option>
        ))}
      </SelectField>
      <TextField type="date" label={text.from} max={filters.to} {...wiring('from')} />
      <TextField type="date" label={text.to} min={filters.from} {...wiring('to')} />
    </div>
  );
}

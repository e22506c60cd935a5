import { useStore } from 'zustand';
import { SelectField } from '#client/components/field.tsx';
import { profileText as text } from '#client/text/profiles.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { changeProfile, type Profile, type ProfileEdit, removeProfile } from '../model/profile-edits.ts';
import { Choice, Figure, Words } from './form-fields.tsx';
import type { ListedProfile } from './profiles-pane.tsx';
import { SmallButton } from './schedule-pane.tsx';

interface ProfileFieldsProps {
  store: DeskStore;
  id: string;
  profile: Profile;
  profiles: readonly ListedProfile[];
  onChoose: (id: string) => void;
}

/** Which profile is shown, what it is called and is, and how closely it is read. */
export function ProfileFields({ store, id, profile, profiles, onChoose }: ProfileFieldsProps) {
  const disabled = useStore(store, (state) => state.readOnly);
  const { length } = unitNames(store.getState().document.unitSystem);
  const take = (edit: ProfileEdit) => store.run(edit.label, edit.ops);
  return (
    <div className="sticky left-0 flex flex-wrap items-end gap-x-3 gap-y-2 px-2.5 pb-2 [&>div]:w-32 [&>div:nth-last-of-type(2)]:w-44 [&>div:last-of-type]:w-52">
      {profiles.length > 1 ? (
        <SelectField label={text.chosen} value={id} onChange={(event) => onChoose(event.target.value)}>
          {profiles.map((each) => (
            <option key={each.id} value={each.id}>
              {each.value.name || text.unnamed}
            </option>
          ))}
        </SelectField>
      ) : null}
      <Words
        label={text.name}
        value={profile.name}
        maxLength={120}
        disabled={disabled}
        onCommit={(name) => take(changeProfile(id, profile, { name }))}
      />
      <Choice
        label={text.use}
        value={profile.use}
        names={text.uses}
        disabled={disabled}
        onCommit={(use) => take(changeProfile(id, profile, { use }))}
      />
      <Figure
        label={
          <>
            {text.spacing(length)}{' '}
            <span className="font-normal text-ink-2">
              {profile.place.on === 'grid' ? text.gridSpacingHint : text.spacingHint}
            </span>
          </>
        }
        value={profile.spacing}
        optional
        positive
        disabled={disabled}
        onCommit={(spacing) => take(changeProfile(id, profile, { spacing }))}
      />
      <span className="flex flex-wrap gap-2 pb-[3px]">
        <HideButton store={store} />
        {disabled ? null : (
          <SmallButton onClick={() => take(removeProfile(id, profile.name))}>{text.remove}</SmallButton>
        )}
      </span>
    </div>
  );
}

/** Takes the profiles and their diagrams off the sheet, or puts them back. */
function HideButton({ store }: { store: DeskStore }) {
  const kinds = useStore(store, (state) => state.hiddenKinds);
  const hidden = kinds.includes('profile');
  const toggle = () =>
    store.setHidden(hidden ? kinds.filter((kind) => kind !== 'profile') : [...kinds, 'profile']);
  return (
    <SmallButton onClick={toggle}>
      {hidden ? text.show : text.hide}
      <span className="sr-only"> {text.onSheet}</span>
    </SmallButton>
  );
}

import { type ReactNode, useState } from 'react';
import { useStore } from 'zustand';
import { useNotice } from '#client/components/notice.tsx';
import { copyText } from '#client/lib/copy-text.ts';
import { downloadText } from '#client/lib/download.ts';
import { sentenceText } from '#client/lib/figures.ts';
import { localeStore } from '#client/lib/locale.ts';
import { profileText as text } from '#client/text/profiles.ts';
import { scheduleText } from '#client/text/schedule.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import type { ProfileReading } from '#shared/contract/reading-quantities.ts';
import { BYTE_ORDER_MARK } from '#shared/text/csv.ts';
import { cleanFileName } from '#shared/text/file-name.ts';
import { profileCsv, profileRows } from '#shared/text/profile-csv.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { Profile } from '../model/profile-edits.ts';
import { selectOne } from '../model/selection.ts';
import type { MarginForm } from './margin-form.tsx';
import { ProfileFields } from './profile-fields.tsx';
import { ProfileTable } from './profile-table.tsx';
import { ScheduleState, SmallButton } from './schedule-pane.tsx';
import { tableTsv } from './schedule-text.ts';
import { UpliftTable } from './uplift-table.tsx';
import { useDeskState } from './use-desk-state.ts';

interface ProfilesPaneProps {
  store: DeskStore;
  views: ReactNode;
  netName: string;
  onForm: ((form: MarginForm) => void) | null;
  onSheet: () => void;
}

/** The profiles of the net, one shown at a time: what it is, the uplift of a base, and its table. */
export function ProfilesPane({ store, views, netName, onForm, onSheet }: ProfilesPaneProps) {
  const { document, reading, documentRevision, readingOf, readingFailed, readOnly } = useDeskState(
    store,
    'document',
    'reading',
    'documentRevision',
    'readingOf',
    'readingFailed',
    'readOnly',
  );
  const { profiles, shown, choose } = useShownProfile(store);
  const stale = readingOf !== documentRevision;
  const read = reading?.profiles.find(({ id }) => id === shown?.id);
  const draw = () => {
    store.setTool('profile');
    onSheet();
  };
  return (
    <section aria-label={text.title} aria-busy={stale} className="relative h-full overflow-auto bg-film">
      <div className="sticky left-0 flex flex-wrap items-baseline gap-x-3 gap-y-1 px-2.5 py-2">
        {views}
        {stale ? <span className="text-ink-2">{text.workingOut}</span> : null}
        <span className="ml-auto flex flex-wrap gap-2">
          {onForm === null ? null : (
            <>
              <SmallButton onClick={draw}>{text.draw}</SmallButton>
              <SmallButton onClick={() => onForm({ form: 'pasteProfile' })}>{text.paste}</SmallButton>
              <SmallButton onClick={() => onForm({ form: 'gridProfile' })}>{text.grid}</SmallButton>
            </>
          )}
          {read && read.samples.length > 0 ? <TakeAway store={store} read={read} netName={netName} /> : null}
        </span>
      </div>
      <ScheduleState reading={reading} failed={readingFailed} />
      {shown === undefined ? (
        <p className="m-0 px-2.5 py-1 text-ink-2">{readOnly ? text.emptyReadOnly : text.empty}</p>
      ) : (
        <>
          <ProfileFields
            key={shown.id}
            store={store}
            id={shown.id}
            profile={shown.value}
            profiles={profiles}
            onChoose={choose}
          />
          <div className={stale ? 'opacity-60' : ''}>
            {read?.remark ? (
              <p className="m-0 bg-doubt px-2.5 py-1.5 text-attention">{sentenceText(read.remark.text)}</p>
            ) : null}
            {read?.uplift ? <UpliftTable uplift={read.uplift} unitSystem={document.unitSystem} /> : null}
            {read && read.samples.length > 0 ? <ProfileTable document={document} read={read} /> : null}
          </div>
          {shown.value.finished ? null : <p className="m-0 px-2.5 py-1 text-attention">{text.unfinished}</p>}
        </>
      )}
      <p className="sticky left-0 m-0 px-2.5 py-2 text-sm text-ink-2">{scheduleText.caution}</p>
    </section>
  );
}

export type ListedProfile = { readonly id: string; readonly value: Profile };

/** The profile that is chosen on the sheet; else the one chosen last, else the first. */
function useShownProfile(store: DeskStore) {
  const document = useStore(store, (state) => state.document);
  const selection = useStore(store, (state) => state.selection);
  const [last, setLast] = useState<string | undefined>(undefined);
  const chosen = selection.kind === 'profile' ? selection.ids[0] : undefined;
  if (chosen !== undefined && chosen !== last) setLast(chosen);
  const profiles: ListedProfile[] = entitiesOf(document, 'profile').sort(
    (a, b) => a.value.order - b.value.order,
  );
  const held = profiles.find(({ id }) => id === (chosen ?? last));
  return {
    profiles,
    shown: held ?? profiles[0],
    choose: (id: string) => {
      setLast(id);
      store.select(selectOne('profile', id));
    },
  };
}

function TakeAway({ store, read, netName }: { store: DeskStore; read: ProfileReading; netName: string }) {
  const notice = useNotice();
  const copy = async () => {
    const done = await copyText(tableTsv(profileRows(store.getState().document, read)));
    notice(done ? text.copied : text.notCopied);
  };
  const download = () => {
    const csv = profileCsv(store.getState().document, read, localeStore.getState().mark);
    const name = cleanFileName(text.fileName(netName, read.name));
    downloadText(BYTE_ORDER_MARK + csv, `${name}.csv`, 'text/csv;charset=utf-8');
  };
  return (
    <>
      <SmallButton onClick={() => void copy()}>{text.copy}</SmallButton>
      <SmallButton onClick={download}>{text.download}</SmallButton>
    </>
  );
}

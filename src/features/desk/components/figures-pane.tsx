import { useEffect, useState } from 'react';
import { HeadingSwitch } from '#client/components/heading-switch.tsx';
import { exitsText } from '#client/text/exits.ts';
import { profileText } from '#client/text/profiles.ts';
import { scheduleText } from '#client/text/schedule.ts';
import type { DeskState, DeskStore } from '../model/desk-state.ts';
import type { NetDownload } from './download-menu.tsx';
import { ExitsPane } from './exits-pane.tsx';
import type { MarginForm } from './margin-form.tsx';
import { ProfilesPane } from './profiles-pane.tsx';
import { SchedulePane } from './schedule-pane.tsx';

type FiguresView = 'points' | 'profiles' | 'exits';
const TITLES: Readonly<Record<FiguresView, string>> = {
  points: scheduleText.title,
  profiles: profileText.title,
  exits: exitsText.title,
};

interface FiguresPaneProps {
  store: DeskStore;
  /** Name of the net, for the files that are made of its tables. */
  netName: string;
  onDownload: (what: NetDownload) => void;
  /** Opens a form in the margin; null where nothing may be added. */
  onForm: ((form: MarginForm) => void) | null;
  /** Shows the sheet, where it is not beside the table already. */
  onSheet: () => void;
}

/** The tables below the sheet: reading points, profiles, exits; the one that goes with what is chosen comes forward. */
export function FiguresPane({ store, netName, onDownload, onForm, onSheet }: FiguresPaneProps) {
  const [shown, setShown] = useState<FiguresView>('points');
  useEffect(
    () =>
      store.subscribe((state, before) => {
        const asked = viewFor(state);
        if (asked !== null && (asked !== viewFor(before) || state.tool !== before.tool)) setShown(asked);
      }),
    [store],
  );
  const views = <HeadingSwitch titles={TITLES} shown={shown} onShow={setShown} />;
  if (shown === 'profiles') {
    return <ProfilesPane store={store} views={views} netName={netName} onForm={onForm} onSheet={onSheet} />;
  }
  if (shown === 'exits') return <ExitsPane store={store} views={views} />;
  return (
    <SchedulePane
      store={store}
      className="h-full"
      views={views}
      onSheet={onSheet}
      onDownload={onDownload}
      onAdd={onForm === null ? null : () => onForm({ form: 'point' })}
    />
  );
}

/** The table that belongs to the tool in hand or to what is chosen; null when any may stay. */
function viewFor({ tool, selection }: DeskState): FiguresView | null {
  if (selection.kind === 'profile' || tool === 'profile') return 'profiles';
  return selection.kind === 'readingPoint' || tool === 'readingPoint' ? 'points' : null;
}

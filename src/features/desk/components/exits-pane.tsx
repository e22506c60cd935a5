import type { ReactNode } from 'react';
import { fixedText } from '#client/lib/figures.ts';
import { exitsText as text } from '#client/text/exits.ts';
import { scheduleText } from '#client/text/schedule.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { ExitTable } from './exit-table.tsx';
import { HeaveTable } from './heave-table.tsx';
import { PublishedValues } from './published-values.tsx';
import { ScheduleState } from './schedule-pane.tsx';
import { SeepageTable } from './seepage-table.tsx';
import { useDeskState } from './use-desk-state.ts';

/** Where the water leaves and what it does there: exit gradients, heave, creep, and the seepage to each outlet. */
export function ExitsPane({ store, views }: { store: DeskStore; views: ReactNode }) {
  const { document, reading, documentRevision, readingOf, readingFailed } = useDeskState(
    store,
    'document',
    'reading',
    'documentRevision',
    'readingOf',
    'readingFailed',
  );
  const stale = readingOf !== documentRevision;
  return (
    <section aria-label={text.title} aria-busy={stale} className="relative h-full overflow-auto bg-film">
      <div className="sticky left-0 flex flex-wrap items-baseline gap-x-3 gap-y-1 px-2.5 py-2">
        {views}
        {stale ? <span className="text-ink-2">{text.workingOut}</span> : null}
      </div>
      <ScheduleState reading={reading} failed={readingFailed} />
      {reading ? (
        <div className={`flex flex-col gap-3 px-2.5 ${stale ? 'opacity-60' : ''}`}>
          <Part title={text.exits.title} lead={text.exits.lead}>
            {reading.exits.length === 0 ? (
              <Nothing>{text.exits.none}</Nothing>
            ) : (
              <ExitTable document={document} exits={reading.exits} onShow={store.lookAt} />
            )}
          </Part>
          <Part title={text.heave.title}>
            {reading.stability.heave.length === 0 ? (
              <Nothing>{text.heave.none}</Nothing>
            ) : (
              <HeaveTable document={document} heave={reading.stability.heave} />
            )}
          </Part>
          <Part title={text.creep.title}>
            <Creep creep={reading.stability.creep} unit={unitNames(document.unitSystem).length} />
          </Part>
          <Part title={text.seepage.title}>
            <SeepageTable document={document} reading={reading} />
          </Part>
          <PublishedValues />
        </div>
      ) : null}
      <p className="sticky left-0 m-0 px-2.5 py-2 text-sm text-ink-2">{scheduleText.caution}</p>
    </section>
  );
}

function Part({ title, lead, children }: { title: string; lead?: string; children: ReactNode }) {
  return (
    <section>
      <h3 className="m-0 text-base font-semibold">
        {title}
        {lead ? <span className="ml-2 text-sm font-normal text-ink-2">{lead}</span> : null}
      </h3>
      {children}
    </section>
  );
}

function Nothing({ children }: { children: string }) {
  return <p className="m-0 text-ink-2">{children}</p>;
}

type CreepRead = Parameters<typeof creepSentence>[0];

function Creep({ creep, unit }: { creep: CreepRead | null; unit: string }) {
  if (creep === null) return <Nothing>{text.creep.none}</Nothing>;
  return <p className="m-0">{creepSentence(creep, unit)}</p>;
}

function creepSentence(
  creep: { steep: number; flat: number; weightedLength: number; weightedRatio: number | null },
  unit: string,
): string {
  const [steep, flat, weighted] = [creep.steep, creep.flat, creep.weightedLength].map((length) =>
    fixedText(length, 1),
  );
  const ratio =
    creep.weightedRatio === null ? text.creep.noRatio : text.creep.ratio(fixedText(creep.weightedRatio, 1));
  return `${text.creep.figures(steep!, flat!, weighted!, unit)} ${ratio}`;
}

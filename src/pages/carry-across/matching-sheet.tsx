import type { KeyboardEvent } from 'react';
import { SheetView } from '#client/features/desk/components/sheet-view.tsx';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';

interface MatchingSheetProps {
  heading: string;
  store: DeskStore;
  sheet: SheetDto;
}

/** One of the two sheets, with its places. */
export function MatchingSheet({ heading, store, sheet }: MatchingSheetProps) {
  return (
    <section aria-label={heading} className="flex min-h-0 min-w-0 flex-col border border-rule bg-film">
      <h2 className="m-0 border-b border-rule px-3.5 py-1.5 text-base font-bold">{heading}</h2>
      {/* biome-ignore lint/a11y/noStaticElementInteractions: takes undo for the sheet that has the focus, before the other could */}
      <div className="flex h-[46vh] min-h-72 flex-col" onKeyDown={(event) => takeBackHere(event, store)}>
        <SheetView
          key={sheet.id}
          store={store}
          sheet={sheet}
          frame={null}
          notes={[]}
          label={heading}
          className="min-h-0 flex-1"
        />
      </div>
    </section>
  );
}

/** Two sheets listen to the keys of the page: undo belongs to the one in which it is pressed. */
function takeBackHere(event: KeyboardEvent, store: DeskStore): void {
  const key = event.key.toLowerCase();
  if (!(event.ctrlKey || event.metaKey) || event.altKey || (key !== 'z' && key !== 'y')) return;
  event.preventDefault();
  if (key === 'y' || event.shiftKey) store.redo();
  else store.undo();
}

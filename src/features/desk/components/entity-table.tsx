import type { ReactNode } from 'react';
import { Button } from '#client/components/button.tsx';
import { Actions, Dialog } from '#client/components/dialog.tsx';
import { entityTableText as text } from '#client/text/entity-table.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { lineRows, placeToShow } from '../model/entity-rows.ts';
import { AddKnownPoint, AddLine, AddReadingPoint } from './entity-table-add.tsx';
import { LineTable } from './entity-table-lines.tsx';
import { KnownPointTable, ReadingPointTable } from './entity-table-points.tsx';
import { useDeskState } from './use-desk-state.ts';

/** Every line and point of the net in tables, to be read, edited, added and removed without the sheet. */
export default function EntityTable({ store, onClose }: { store: DeskStore; onClose: () => void }) {
  const state = useDeskState(store, 'document', 'reading', 'readOnly', 'hiddenKinds', 'lockedKinds');
  const { document, reading, readOnly } = state;
  const lines = lineRows(state);
  const known = entitiesOf(document, 'knownPoint');
  const points = entitiesOf(document, 'readingPoint').sort((a, b) => a.value.order - b.value.order);

  function show(kind: 'line' | 'readingPoint' | 'knownPoint', id: string): void {
    const at = placeToShow(document, reading, id);
    store.select({ kind, ids: [id] });
    if (at !== null) store.lookAt(at);
    onClose();
  }

  const shared = { store, disabled: readOnly, onShow: show };
  return (
    <Dialog title={text.title} full onClose={onClose}>
      <Part title={text.lines(lines.length)} none={lines.length === 0 ? text.noLines : null}>
        <LineTable rows={lines} document={document} {...shared} />
      </Part>
      {readOnly ? null : <AddLine store={store} />}
      <Part
        title={text.readingPoints(points.length)}
        none={points.length === 0 ? text.noReadingPoints : null}
      >
        <ReadingPointTable points={points} document={document} reading={reading} {...shared} />
      </Part>
      {readOnly ? null : <AddReadingPoint store={store} />}
      <Part title={text.knownPoints(known.length)} none={known.length === 0 ? text.noKnownPoints : null}>
        <KnownPointTable points={known} document={document} reading={reading} {...shared} />
      </Part>
      {readOnly ? null : <AddKnownPoint store={store} />}
      <Actions>
        <Button onClick={onClose}>{text.close}</Button>
      </Actions>
    </Dialog>
  );
}

function Part({ title, none, children }: { title: string; none: string | null; children: ReactNode }) {
  return (
    <section className="mt-5 first:mt-0">
      <h3 className="mt-0 mb-1 text-base font-bold">{title}</h3>
      {none === null ? children : <p className="m-0 text-ink-2">{none}</p>}
    </section>
  );
}

import { useEffect, useState } from 'react';
import { CheckField } from '#client/components/field.tsx';
import { SheetView } from '#client/features/desk/components/sheet-view.tsx';
import type { Guides } from '#client/features/desk/model/guides.ts';
import { compareText as text } from '#client/text/compare.ts';
import { entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import type { ComparedNet } from './compared-net.ts';
import { useShownNet } from './use-shown-net.ts';

/** The first net on its sheet, with the lines of the second drawn over it. */
export function SheetsOver({ one, other }: { one: ComparedNet; other: ComparedNet }) {
  const [drawnOver, setDrawnOver] = useState(true);
  const { store } = useShownNet(one);
  useEffect(() => {
    store.setGuides('compared', drawnOver ? linesOf(other.document) : null);
  }, [store, other.document, drawnOver]);
  return (
    <>
      <div className="border-b border-rule px-3.5 py-2">
        <CheckField
          label={text.drawOver(other.name)}
          checked={drawnOver}
          onChange={(event) => setDrawnOver(event.target.checked)}
        />
      </div>
      <div className="flex h-[56vh] min-h-72 flex-col">
        <SheetView
          key={one.sheet.id}
          store={store}
          sheet={one.sheet}
          frame={one.frame}
          notes={[]}
          label={text.sheetOf(one.name)}
          className="min-h-0 flex-1"
        />
      </div>
    </>
  );
}

function linesOf(document: FlowNetDocument): Guides {
  const lines = entitiesOf(document, 'line')
    .filter(({ value }) => value.finished && value.points.length > 1)
    .map(({ id, value }) => ({ id, tone: 'before' as const, points: value.points }));
  return { areas: [], marks: [], lines };
}

import { useEffect, useMemo, useState } from 'react';
import { SheetView } from '#client/features/desk/components/sheet-view.tsx';
import { type LinkedSide, linkViews } from '#client/features/desk/model/linked-view.ts';
import { rasterOf } from '#client/features/desk/model/sheet-raster.ts';
import { createViewStore, type ViewStore } from '#client/features/desk/model/view-store.ts';
import { compareText as text } from '#client/text/compare.ts';
import { fittedMap } from '#shared/compute/set-out.ts';
import { metresPerLengthUnit } from '#shared/compute/units.ts';
import type { ComparedNet } from './compared-net.ts';
import { useShownNet } from './use-shown-net.ts';

interface Sides {
  one: ComparedNet;
  other: ComparedNet;
}

/** Both sheets side by side; where both are set out they show the same part of the section. */
export function SheetsBeside({ one, other }: Sides) {
  const [left, right] = [useLinkedSide(one), useLinkedSide(other)];
  useEffect(
    () => (left.linked && right.linked ? linkViews(left.linked, right.linked) : undefined),
    [left.linked, right.linked],
  );
  return (
    <>
      <p className="m-0 border-b border-rule px-3.5 py-2 text-ink-2">{linkedText(left, right)}</p>
      <div className="grid grid-cols-[minmax(0,1fr)] md:grid-cols-2">
        <OneSheet net={one} views={left.views} />
        <OneSheet net={other} views={right.views} />
      </div>
    </>
  );
}

interface ShownSide {
  net: ComparedNet;
  views: ViewStore;
  /** Null while the section is not set out. */
  linked: LinkedSide | null;
}

function useLinkedSide(net: ComparedNet): ShownSide {
  const { sheet, frame, document } = net;
  const [views] = useState(() => createViewStore(rasterOf(sheet, true), frame));
  const linked = useMemo(() => {
    const map = fittedMap(document);
    return map && { views, map, metresPerUnit: metresPerLengthUnit(document.unitSystem) };
  }, [views, document]);
  return { net, views, linked };
}

function linkedText(left: ShownSide, right: ShownSide): string {
  const open = [left, right].filter(({ linked }) => linked === null);
  if (open.length === 0) return text.linked;
  return text.notLinked(open.length === 2 ? text.areNotSetOut : text.isNotSetOut(open[0]!.net.name));
}

function OneSheet({ net, views }: { net: ComparedNet; views: ViewStore }) {
  const { store } = useShownNet(net);
  return (
    <section
      aria-label={text.sheetOf(net.name)}
      className="flex min-w-0 flex-col border-rule not-first:border-t md:not-first:border-t-0 md:not-first:border-l"
    >
      <h3 className="m-0 border-b border-rule px-3.5 py-1.5 text-base font-semibold">{net.name}</h3>
      <div className="flex h-[46vh] min-h-72 flex-col">
        <SheetView
          store={store}
          sheet={net.sheet}
          frame={net.frame}
          views={views}
          notes={[]}
          label={text.sheetOf(net.name)}
          className="min-h-0 flex-1"
        />
      </div>
    </section>
  );
}

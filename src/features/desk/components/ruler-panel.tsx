import { useMemo, useState } from 'react';
import { useStore } from 'zustand';
import { rulerText as text } from '#client/text/set-out.ts';
import { rulerFigures } from '#shared/compute/ruler.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { NO_RULER, rulerOf } from '../model/ruler.ts';
import { areaWords, legCells, lengthDecimals, rulerCopy, rulerHeads, wholeCells } from './ruler-words.ts';

/** With more legs than this the table is scrolled, and takes the pointer for it. */
const LEGS_IN_SIGHT = 7;

/** What the ruler has measured, leg by leg, while it is in hand. */
export function RulerPanel({ store }: { store: DeskStore }) {
  const inHand = useStore(store, (state) => state.tool === 'ruler');
  return inHand ? <Measured store={store} /> : null;
}

function Measured({ store }: { store: DeskStore }) {
  const document = useStore(store, (state) => state.document);
  const { places, closed } = useStore(rulerOf(store));
  const { map, unit, decimals, exaggerated } = useSection(document);
  const figures = useMemo(() => rulerFigures(places, closed, map), [places, closed, map]);
  const note = map === null ? text.notSetOut : exaggerated ? text.exaggerated : null;
  return (
    <section
      data-over-sheet={figures.legs.length > LEGS_IN_SIGHT || undefined}
      aria-label={text.title}
      className="max-h-[min(16rem,40cqh)] max-w-full overflow-auto rounded-sheet border border-rule bg-film px-2.5 py-1.5 text-sm"
    >
      {figures.legs.length === 0 ? (
        <p className="m-0">{text.empty}</p>
      ) : (
        <>
          <LegTable figures={figures} decimals={decimals} unit={unit} />
          <div data-over-sheet className="mt-1 flex items-center gap-3">
            <output>{areaWords(figures, decimals, unit)}</output>
            <CopyButton words={rulerCopy(figures, decimals, unit)} />
            <button
              type="button"
              className="touch underline"
              onClick={() => rulerOf(store).setState(NO_RULER)}
            >
              {text.clear}
            </button>
          </div>
        </>
      )}
      {note && <p className="m-0 mt-1 max-w-80 text-ink-2">{note}</p>}
    </section>
  );
}

export function useSection(document: FlowNetDocument) {
  return useMemo(() => {
    const { map, reading } = readSetOut(document);
    return {
      map,
      unit: unitNames(document.unitSystem).length,
      decimals: lengthDecimals(map?.unitsPerPx ?? null),
      exaggerated: map !== null && Math.abs((reading.exaggeration ?? 1) - 1) > 1e-9,
    };
  }, [document]);
}

function LegTable({
  figures,
  decimals,
  unit,
}: {
  figures: ReturnType<typeof rulerFigures>;
  decimals: number;
  unit: string;
}) {
  const cell = 'px-1.5 py-0.5 text-right tabular-nums';
  return (
    <table className="border-collapse">
      <thead>
        <tr>
          {rulerHeads(figures, unit).map((head) => (
            <th key={head} scope="col" className={`${cell} font-semibold text-ink-2`}>
              {head}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {figures.legs.map((leg, i) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: a leg is known by its number only.
          <tr key={i}>
            {[text.legNumber(i + 1), ...legCells(leg, decimals)].map((words, k) => (
              // biome-ignore lint/suspicious/noArrayIndexKey: columns do not move.
              <td key={k} className={cell}>
                {words}
              </td>
            ))}
          </tr>
        ))}
        {figures.legs.length > 1 && (
          <tr className="border-t border-rule font-semibold">
            <th scope="row" className={cell}>
              {text.whole}
            </th>
            {wholeCells(figures, decimals).map((words, k) => (
              // biome-ignore lint/suspicious/noArrayIndexKey: columns do not move.
              <td key={k} className={cell}>
                {words}
              </td>
            ))}
          </tr>
        )}
      </tbody>
    </table>
  );
}

function CopyButton({ words }: { words: string }) {
  const [copied, setCopied] = useState('');
  return (
    <button
      type="button"
      className="touch ml-auto underline"
      onClick={() => void navigator.clipboard.writeText(words).then(() => setCopied(words))}
    >
      {copied === words ? text.copied : text.copy}
    </button>
  );
}

import { useEffect, useMemo, useState } from 'react';
import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { fixedText } from '#client/lib/figures.ts';
import { adoptionText as text } from '#client/text/adoption.ts';
import { type Adoptable, type AdoptableKind, adoptableLines } from '#shared/compute/beside/adopted-lines.ts';
import type { PlacedNet } from '#shared/compute/beside/placed-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { elevationUnit } from '#shared/text/unit-text.ts';
import { adoptableOfGuide, adoptLines, isAdopted, traced } from '../model/adopt-lines.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { Aside, MarginSection } from './margin-section.tsx';

const KINDS: readonly AdoptableKind[] = ['equipotential', 'flowLine', 'phreaticLine'];

/** Takes lines of the computed net into the traced one: a kind at a time, one by one, or as clicked on the sheet. */
export function AdoptLines({ net, store, current }: { net: PlacedNet; store: DeskStore; current: boolean }) {
  const document = useStore(store, (state) => state.document);
  const readOnly = useStore(store, (state) => state.readOnly);
  const lines = useMemo(() => adoptableLines(net), [net]);
  const picked = usePicked(store, lines);
  if (readOnly || lines.length === 0) return null;
  return (
    <MarginSection title={text.title}>
      <Aside>{text.lead}</Aside>
      {current ? null : <p className="m-0 text-sm text-attention">{text.outOfDate}</p>}
      {KINDS.map((kind) => (
        <AdoptKind
          key={kind}
          lines={lines.filter((line) => line.kind === kind)}
          {...{ kind, store, document, current }}
        />
      ))}
      {picked === null ? (
        <Aside>{text.pick}</Aside>
      ) : (
        <div role="status">
          <p className="m-0 text-sm">{text.picked}</p>
          <AdoptOne line={picked} {...{ store, document, current }} />
        </div>
      )}
      <details>
        <summary className="touch cursor-pointer text-sm">{text.oneByOne}</summary>
        {lines.map((line) => (
          <AdoptOne key={`${line.kind} ${line.index}`} line={line} {...{ store, document, current }} />
        ))}
      </details>
    </MarginSection>
  );
}

/** The computed line clicked on the sheet last. */
function usePicked(store: DeskStore, lines: readonly Adoptable[]): Adoptable | null {
  const [guideId, setGuideId] = useState<string | null>(null);
  useEffect(
    () => store.onIntent((intent) => intent.type === 'pickComputedLine' && setGuideId(intent.guideId)),
    [store],
  );
  return guideId === null ? null : adoptableOfGuide(lines, guideId);
}

type AdoptProps = { store: DeskStore; document: FlowNetDocument; current: boolean };

function AdoptKind({
  kind,
  lines,
  store,
  document,
  current,
}: AdoptProps & { kind: AdoptableKind; lines: readonly Adoptable[] }) {
  if (lines.length === 0) return null;
  const own = traced(document, kind).length;
  const done = lines.every((line) => isAdopted(document, line));
  return (
    <div className="flex flex-col items-start gap-1">
      {own > 0 ? (
        <Button look="quiet" disabled={!current} onClick={() => adoptLines(store, lines, kind)}>
          {text.inPlace(kind, own)}
        </Button>
      ) : null}
      <Button look="quiet" disabled={done || !current} onClick={() => adoptLines(store, lines)}>
        {text.all(kind, lines.length)}
      </Button>
      {own > 0 ? <Aside>{text.beside(kind, own)}</Aside> : null}
    </div>
  );
}

function AdoptOne({ line, store, document, current }: AdoptProps & { line: Adoptable }) {
  const label = labelOf(line, document);
  return (
    <div className="flex items-baseline justify-between gap-2 border-b border-rule-2 py-0.5 text-sm">
      <span>{label}</span>
      {isAdopted(document, line) ? (
        <span className="text-ink-2">{text.isAdopted}</span>
      ) : (
        <Button
          look="text"
          disabled={!current}
          aria-label={text.one(label)}
          onClick={() => adoptLines(store, [line])}
        >
          {text.adopt}
        </Button>
      )}
    </div>
  );
}

/** An equipotential by its head, a flow line by its number. */
function labelOf({ kind, index, value }: Adoptable, document: FlowNetDocument): string {
  const unit = elevationUnit(document.unitSystem, document.datum);
  const figure = kind === 'equipotential' ? `${fixedText(value, 2)} ${unit}` : String(index + 1);
  return text.lineLabel(kind, kind === 'phreaticLine' ? '' : figure);
}

import { useState } from 'react';
import { v7 as newUuid } from 'uuid';
import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { firstGuessText as text } from '#client/text/desk-palette.ts';
import { entitiesOf, type TracedLine } from '#shared/contract/document.ts';
import type { DeskState, DeskStore } from '../model/desk-state.ts';
import { selectOne } from '../model/selection.ts';
import { keptPoint } from '../tools/line-points.ts';

/** While the phreatic line is to be traced and none is: the offer to draw a first guess of it from the geometry. */
export function FirstGuess({ store }: { store: DeskStore }) {
  const offered = useStore(store, isOffered);
  const [said, setSaid] = useState<string | null>(null);
  if (!offered) return said === null ? null : <Said sentence={said} />;
  const draw = async () => {
    const { guessPhreaticLine } = await import('#shared/compute/phreatic/first-guess.ts');
    const guess = guessPhreaticLine(store.getState().document);
    if (!guess.ok) return setSaid(guess.text);
    const entityId = newUuid();
    const value: TracedLine = {
      kind: 'line',
      line: 'phreaticLine',
      name: '',
      points: guess.points.map(keptPoint),
      finished: true,
      water: null,
      head: null,
      drops: null,
      origin: 'guessed',
    };
    store.run(text.drew, [{ op: 'put', entityId, value }]);
    store.setTool('select');
    store.select(selectOne('line', entityId));
    setSaid(guess.basis);
  };
  return (
    <div className="mx-4 mt-3 text-sm">
      <p className="m-0 mb-1.5 text-ink-2">{text.offer}</p>
      <Button onClick={draw}>{text.draw}</Button>
      {said === null ? null : <Said sentence={said} />}
    </div>
  );
}

function Said({ sentence }: { sentence: string }) {
  return (
    <p role="status" className="mx-4 mt-2 mb-0 text-sm text-ink-2">
      {sentence}
    </p>
  );
}

function isOffered({ tool, readOnly, draft, document }: DeskState): boolean {
  if (tool !== 'phreaticLine' || readOnly || draft !== null) return false;
  return entitiesOf(document, 'line').every(({ value }) => value.line !== 'phreaticLine');
}

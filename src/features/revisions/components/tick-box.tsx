import type { KeyboardEvent } from 'react';
import { checkWorkText as text } from '#client/text/check-work.ts';
import { useCheckWork } from './check-work.tsx';

const ARROWS: Record<string, number> = { ArrowRight: 1, ArrowDown: 1, ArrowLeft: -1, ArrowUp: -1 };

/**
 * The tick at one figure, for who checks the revision. Arrow keys go to the next or the one before, wherever on the page it
 * stands.
 */
export function TickBox({ figureKey }: { figureKey: string }) {
  const work = useCheckWork();
  const figure = work?.figures.find(({ key }) => key === figureKey);
  if (!work || figure === undefined) return null;
  const label = text.tick(figure.of, figure.what);
  const tick = (on: boolean) => work.change(on ? { ticked: [figureKey] } : { unticked: [figureKey] });
  return (
    <label className="mr-1 inline-flex items-center justify-center align-[-1px] pointer-coarse:size-10 pointer-coarse:align-middle">
      <input
        type="checkbox"
        data-tick
        aria-label={label}
        title={label}
        className="m-0 size-[0.875rem] shrink-0 accent-good pointer-coarse:size-5"
        checked={work.ticked.has(figureKey)}
        onChange={(event) => tick(event.target.checked)}
        onKeyDown={goBeside}
      />
    </label>
  );
}

function goBeside(event: KeyboardEvent<HTMLInputElement>): void {
  const step = ARROWS[event.key];
  if (step === undefined || event.altKey || event.ctrlKey || event.metaKey) return;
  const all = [...document.querySelectorAll<HTMLInputElement>('input[data-tick]')].filter((each) =>
    each.checkVisibility(),
  );
  const next = all[all.indexOf(event.currentTarget) + step];
  if (!next) return;
  event.preventDefault();
  next.focus();
}

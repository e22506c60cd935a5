import { type KeyboardEvent, type PointerEvent, useRef } from 'react';
import { classNames } from './class-names.ts';

const STEP_PX = 16;
const FAR_STEP_PX = 64;

export interface PaneSeparatorProps {
  label: string;
  help: string;
  /** Id of the pane that it sizes, and the side of the separator on which that lies. */
  paneId: string;
  side: 'left' | 'right' | 'below';
  /** Pixels that the pane takes; 0 when it is folded. */
  px: number;
  least: number;
  most: number;
  folded: boolean;
  valueText: string;
  foldLabel: string;
  onDrag: (px: number) => void;
  onResize: (px: number) => void;
  onUsual: () => void;
  onFold: () => void;
}

/** The edge of a pane: dragged, moved by arrow keys, put back by a double click, folded by Enter or its button. */
export function PaneSeparator(props: PaneSeparatorProps) {
  const { side, px, folded } = props;
  const start = useRef<{ at: number; px: number } | null>(null);
  const along = side === 'below';
  const towards = side === 'left' ? 1 : -1;
  const place = along ? { bottom: px } : side === 'left' ? { left: px } : { right: px };

  function begin(event: PointerEvent<HTMLDivElement>): void {
    if (event.button !== 0) return;
    event.currentTarget.setPointerCapture(event.pointerId);
    start.current = { at: along ? event.clientY : event.clientX, px };
  }
  function drag(event: PointerEvent): void {
    if (start.current === null) return;
    const moved = (along ? event.clientY : event.clientX) - start.current.at;
    // A press that hardly moves is half of a double click.
    if (Math.abs(moved) > 2 || start.current.px !== px) props.onDrag(start.current.px + towards * moved);
  }
  function key(event: KeyboardEvent): void {
    const used = keyed(event, props, along, towards);
    if (!used) return;
    event.preventDefault();
    event.stopPropagation();
  }

  return (
    <div
      className={classNames(
        'absolute z-10',
        along ? 'inset-x-0 h-[9px] translate-y-1/2' : 'inset-y-0 w-[9px]',
        side === 'left' && '-translate-x-1/2',
        side === 'right' && 'translate-x-1/2',
      )}
      style={place}
    >
      {/* biome-ignore lint/a11y/useSemanticElements: a rule between paragraphs cannot be moved */}
      <div
        role="separator"
        tabIndex={0}
        title={props.help}
        aria-label={props.label}
        aria-controls={props.paneId}
        aria-orientation={along ? 'horizontal' : 'vertical'}
        aria-valuenow={px}
        aria-valuemin={0}
        aria-valuemax={props.most}
        aria-valuetext={props.valueText}
        className={classNames(
          'absolute inset-0 touch-none select-none hover:bg-chosen focus-visible:bg-chosen focus-visible:outline-offset-0',
          along
            ? 'cursor-row-resize pointer-coarse:-inset-y-2'
            : 'cursor-col-resize pointer-coarse:-inset-x-2',
        )}
        onPointerDown={begin}
        onPointerMove={drag}
        onPointerUp={() => {
          start.current = null;
        }}
        onPointerCancel={() => {
          start.current = null;
        }}
        onDoubleClick={props.onUsual}
        onKeyDown={key}
      />
      <button
        type="button"
        aria-label={props.foldLabel}
        title={props.foldLabel}
        aria-expanded={!folded}
        aria-controls={props.paneId}
        // The mark is narrow, what is pressed is not. In pixels, so that it does not grow over the words beside it.
        className={classNames(
          'group absolute flex border-0 bg-transparent p-0',
          along
            ? 'left-1/2 h-[24px] w-[36px] -translate-x-1/2'
            : 'top-1/2 h-[36px] w-[24px] -translate-y-1/2',
          along ? (folded ? 'bottom-1/2 items-end' : '-top-[3px] items-start') : null,
          side === 'left' && (folded ? 'left-1/2' : '-left-[3px]'),
          side === 'right' && (folded ? 'right-1/2 justify-end' : '-right-[3px] justify-end'),
        )}
        onClick={props.onFold}
      >
        <span
          className={classNames(
            'flex items-center justify-center rounded-sheet border border-rule bg-film text-ink-2 group-hover:border-ink group-hover:text-ink',
            along ? 'h-[15px] w-[36px]' : 'h-[36px] w-[15px]',
          )}
        >
          <svg
            width="9"
            height="9"
            viewBox="0 0 9 9"
            aria-hidden="true"
            className={TURNS[side][Number(folded)]}
          >
            <path d="M1.5 3 4.5 6 7.5 3" fill="none" stroke="currentColor" strokeWidth="1.4" />
          </svg>
        </span>
      </button>
    </div>
  );
}

/** The chevron points to where the edge goes: [open, folded]. */
const TURNS: Readonly<Record<PaneSeparatorProps['side'], readonly [string, string]>> = {
  below: ['', 'rotate-180'],
  left: ['rotate-90', '-rotate-90'],
  right: ['-rotate-90', 'rotate-90'],
};

function keyed(
  { key, shiftKey }: KeyboardEvent,
  { px, least, most, onResize, onFold }: PaneSeparatorProps,
  along: boolean,
  towards: number,
): boolean {
  const step = shiftKey ? FAR_STEP_PX : STEP_PX;
  const forward = along ? 'ArrowDown' : 'ArrowRight';
  const backward = along ? 'ArrowUp' : 'ArrowLeft';
  if (key === forward) onResize(px + towards * step);
  else if (key === backward) onResize(px - towards * step);
  else if (key === 'Home') onResize(least);
  else if (key === 'End') onResize(most);
  else if (key === 'Enter') onFold();
  else return false;
  return true;
}

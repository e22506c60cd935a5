import { type KeyboardEvent, type PointerEvent, useId, useRef } from 'react';
import { cleanUpText as text } from '#client/text/clean-up.ts';
import type { PictureSize } from '#shared/compute/renditions/rendition-geometry.ts';
import type { Place, Setting } from '../model/handles.ts';

const STEPS: Readonly<Record<string, Place>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};
const FAST = 10;

type HandleLayerProps = {
  setting: Setting;
  handles: readonly Place[];
  /** The size in whose pixels the handles stand. */
  size: PictureSize;
  onHandles: (handles: readonly Place[], moved: number) => void;
};

const percent = (part: number, whole: number) => `${(100 * part) / whole}%`;

/** Handles over a picture, moved by dragging or by arrow keys, with the line or figure that they make. */
export function HandleLayer({ setting, handles, size, onHandles }: HandleLayerProps) {
  const layer = useRef<HTMLDivElement>(null);
  const helpId = useId();
  const move = (index: number, [x, y]: Place) => {
    const held: Place = [Math.min(size.widthPx, Math.max(0, x)), Math.min(size.heightPx, Math.max(0, y))];
    onHandles(
      handles.map((place, at) => (at === index ? held : place)),
      index,
    );
  };
  const drag = (index: number, event: PointerEvent<HTMLButtonElement>) => {
    if (!event.currentTarget.hasPointerCapture(event.pointerId) || layer.current === null) return;
    const box = layer.current.getBoundingClientRect();
    move(index, [
      ((event.clientX - box.left) / box.width) * size.widthPx,
      ((event.clientY - box.top) / box.height) * size.heightPx,
    ]);
  };
  const key = (index: number, event: KeyboardEvent) => {
    const step = STEPS[event.key];
    const from = handles[index];
    if (step === undefined || from === undefined) return;
    event.preventDefault();
    const by = event.shiftKey ? FAST : 1;
    move(index, [from[0] + step[0] * by, from[1] + step[1] * by]);
  };
  return (
    <div ref={layer} className="absolute inset-0">
      <svg
        viewBox={`0 0 ${size.widthPx} ${size.heightPx}`}
        preserveAspectRatio="none"
        aria-hidden="true"
        className="pointer-events-none absolute inset-0 size-full"
      >
        <Figure setting={setting} handles={handles} className="stroke-film" width={4} />
        <Figure setting={setting} handles={handles} className="stroke-equipotential" width={1.5} />
      </svg>
      <span id={helpId} className="sr-only">
        {text.handleHelp}
      </span>
      {handles.map(([x, y], index) => (
        <button
          key={text.handles[setting][index]}
          type="button"
          aria-label={`${text.handles[setting][index]}: ${text.handlePlace(x, y)}`}
          aria-describedby={helpId}
          className="absolute flex size-10 -translate-x-1/2 -translate-y-1/2 cursor-move touch-none items-center justify-center border-0 bg-transparent p-0"
          style={{ left: percent(x, size.widthPx), top: percent(y, size.heightPx) }}
          onPointerDown={(event) => event.currentTarget.setPointerCapture(event.pointerId)}
          onPointerMove={(event) => drag(index, event)}
          onFocus={() => onHandles(handles, index)}
          onKeyDown={(event) => key(index, event)}
        >
          <span className="size-3.5 rounded-full border-[1.5px] border-equipotential bg-film/70" />
        </button>
      ))}
    </div>
  );
}

function Figure({
  setting,
  handles,
  className,
  width,
}: Pick<HandleLayerProps, 'setting' | 'handles'> & { className: string; width: number }) {
  const [a, b] = handles;
  if (!a || !b) return null;
  const corners: readonly Place[] = setting === 'crop' ? [a, [b[0], a[1]], b, [a[0], b[1]]] : handles;
  const points = corners.map((place) => place.join(',')).join(' ');
  const look = { points, strokeWidth: width, vectorEffect: 'non-scaling-stroke' } as const;
  return setting === 'level' ? (
    <polyline {...look} className={`fill-none ${className}`} />
  ) : (
    <polygon {...look} className={`fill-none ${className}`} />
  );
}

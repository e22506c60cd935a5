import { conflictText as text } from '#client/text/conflict.ts';
import type { DocumentEntity, FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { Conflict } from '../model/shared-edits.ts';

const WIDTH_PX = 360;
const HEIGHT_PX = 180;
const MARGIN = 0.12;
/** Sheet pixels that are shown at least, so that a change of a pixel is not blown up to nothing known. */
const LEAST_PX = 40;

type Box = readonly [left: number, top: number, width: number, height: number];

/** Both shapes of something that two people changed, one over the other, with the net around them in grey. */
export function ConflictPicture({ conflict, document }: { conflict: Conflict; document: FlowNetDocument }) {
  const mine = shapeOf(conflict.mine);
  const theirs = shapeOf(conflict.theirs);
  if (mine.length + theirs.length === 0) return null;
  const box = boxAbout([...mine, ...theirs]);
  const around = Object.values(document.entities).filter(({ id }) => id !== conflict.entityId);
  return (
    <figure className="m-0 flex flex-wrap items-start gap-3 border-b border-rule p-2">
      <svg
        role="img"
        aria-label={text.picture}
        viewBox={box.join(' ')}
        className="h-[180px] max-w-full grow basis-[18.75rem] border border-rule-2 bg-white"
      >
        {around.map(({ id, value }) => (
          <Stroke key={id} points={shapeOf(value)} colour="var(--color-rule)" width={1} />
        ))}
        <Stroke points={theirs} colour="var(--color-flow-line)" width={3} dash="7 4" marked />
        <Stroke points={mine} colour="var(--color-equipotential)" width={2.2} marked />
      </svg>
      <figcaption className="text-sm text-ink-2">
        <Key colour="var(--color-equipotential)">{mine.length === 0 ? text.noMine : text.mine}</Key>
        <Key colour="var(--color-flow-line)" dash="7 4">
          {theirs.length === 0 ? text.noTheirs : text.theirs}
        </Key>
        <span>{text.rest}</span>
      </figcaption>
    </figure>
  );
}

/** A line by its vertices, a single place by a ring; widths are of the screen whatever the picture's scale. */
function Stroke({
  points,
  colour,
  width,
  dash,
  marked = false,
}: {
  points: readonly SheetPoint[];
  colour: string;
  width: number;
  dash?: string;
  marked?: boolean;
}) {
  const look = { stroke: colour, strokeWidth: width, vectorEffect: 'non-scaling-stroke' } as const;
  return (
    <g fill="none">
      <polyline points={points.map((at) => at.join(',')).join(' ')} strokeDasharray={dash} {...look} />
      {marked
        ? points.map(([x, y]) => (
            // A stroke of no length with round ends is a dot of the screen's size.
            <path
              key={`${x} ${y}`}
              d={`M${x} ${y}h0`}
              strokeLinecap="round"
              {...look}
              strokeWidth={width * 2.6}
            />
          ))
        : null}
    </g>
  );
}

function Key({ colour, dash, children }: { colour: string; dash?: string; children: string }) {
  return (
    <span className="flex items-center gap-2">
      <svg width="28" height="8" aria-hidden="true">
        <path d="M1 4h26" stroke={colour} strokeWidth="2.4" strokeDasharray={dash} />
      </svg>
      {children}
    </span>
  );
}

/** Where something lies on the sheet; empty for what has no place there. */
export function shapeOf(value: DocumentEntity | null): readonly SheetPoint[] {
  switch (value?.kind) {
    case 'line':
      return value.points;
    case 'knownPoint':
      return [value.at];
    case 'readingPoint':
      return value.place.on === 'sheet' ? [value.place.at] : [];
    case 'profile':
      return value.place.on === 'sheet' ? value.place.points : [];
    case 'soil':
      return value.places;
    default:
      return [];
  }
}

/** The part of the sheet around some places, in the proportions of the picture. */
export function boxAbout(points: readonly SheetPoint[]): Box {
  const xs = points.map(([x]) => x);
  const ys = points.map(([, y]) => y);
  const [left, top] = [Math.min(...xs), Math.min(...ys)];
  const [across, down] = [Math.max(...xs) - left, Math.max(...ys) - top];
  const scale = Math.max(across / WIDTH_PX, down / HEIGHT_PX, LEAST_PX / HEIGHT_PX) * (1 + 2 * MARGIN);
  const [width, height] = [WIDTH_PX * scale, HEIGHT_PX * scale];
  return [left + across / 2 - width / 2, top + down / 2 - height / 2, width, height];
}

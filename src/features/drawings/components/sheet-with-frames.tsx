import { type PointerEvent, useState } from 'react';
import { drawingsText as text } from '#client/text/drawings.ts';
import type { SectionDto, SheetDto } from '#shared/contract/drawings.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { type Frame, frameBetween, sheetPointAt } from './frame.ts';
import { percent, SheetPicture } from './sheet-picture.tsx';

interface SheetWithFramesProps {
  sheet: SheetDto;
  drawingName: string;
  sections: readonly SectionDto[];
  /** The frame being set; undefined when none is. */
  framing: { frame: Frame | null; onFrame: (frame: Frame | null) => void } | undefined;
}

/** The sheet with the frames of its sections; while one is being set, a drag draws it. */
export function SheetWithFrames({ sheet, drawingName, sections, framing }: SheetWithFramesProps) {
  const [start, setStart] = useState<readonly [number, number] | null>(null);
  const pointOf = (event: PointerEvent<SVGSVGElement>) =>
    sheetPointAt(event, event.currentTarget.getBoundingClientRect(), sheet);
  const down = (event: PointerEvent<SVGSVGElement>) => {
    if (!framing || event.button !== 0) return;
    event.currentTarget.setPointerCapture(event.pointerId);
    setStart(pointOf(event));
  };
  const move = (event: PointerEvent<SVGSVGElement>) => {
    if (!framing || !start) return;
    const frame = frameBetween(start, pointOf(event), sheet);
    if (frame) framing.onFrame(frame);
  };
  return (
    <SheetPicture
      sheet={sheet}
      label={text.pictureOf(drawingName, sheet.pageNumber)}
      framing={framing !== undefined}
      labels={sections.map((section) => <SectionLabel key={section.id} section={section} sheet={sheet} />)}
      onPointerDown={down}
      onPointerMove={move}
      onPointerUp={() => setStart(null)}
    >
      {sections.map((section) => (
        <FrameOutline key={section.id} frame={section.frame} className="fill-none stroke-phreatic" />
      ))}
      <FrameOutline frame={framing?.frame ?? null} className="fill-equipotential/10 stroke-equipotential" />
    </SheetPicture>
  );
}

function SectionLabel({ section, sheet }: { section: SectionDto; sheet: SheetDto }) {
  if (!section.frame) return null;
  const [x, y] = section.frame;
  const place = { left: percent(x, sheet.widthPx), top: percent(y, sheet.heightPx) };
  return (
    <span
      style={place}
      className="pointer-events-none absolute bg-film px-1 text-xs font-semibold whitespace-nowrap text-phreatic"
    >
      {sectionTitle(section.name)}
    </span>
  );
}

function FrameOutline({ frame, className }: { frame: Frame | null; className: string }) {
  if (!frame) return null;
  const [x, y, width, height] = frame;
  return (
    <rect
      x={x}
      y={y}
      width={width}
      height={height}
      strokeWidth={2}
      vectorEffect="non-scaling-stroke"
      className={className}
    />
  );
}

import { type PointerEvent, useState } from 'react';
import { sectionTitle, drawingsText as text } from '#client/text/drawings.ts';
import type { SectionDto, SheetDto } from '#shared/contract/drawings.ts';
import { type Frame, frameBetween, sheetPointAt } from './frame.ts';
import { SheetPicture } from './sheet-picture.tsx';

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
      onPointerDown={down}
      onPointerMove={move}
      onPointerUp={() => setStart(null)}
    >
      {sections.map((section) => (
        <SectionFrame key={section.id} section={section} sheet={sheet} />
      ))}
      {framing?.frame ? (
        <FrameOutline frame={framing.frame} className="fill-equipotential/10 stroke-equipotential" />
      ) : null}
    </SheetPicture>
  );
}

function SectionFrame({ section, sheet }: { section: SectionDto; sheet: SheetDto }) {
  if (!section.frame) return null;
  const size = sheet.widthPx / 55;
  return (
    <g>
      <FrameOutline frame={section.frame} className="fill-none stroke-phreatic" />
      <text
        x={section.frame[0] + size * 0.4}
        y={section.frame[1] + size * 1.2}
        fontSize={size}
        className="fill-phreatic stroke-film font-semibold [paint-order:stroke]"
        strokeWidth={size * 0.3}
      >
        {sectionTitle(section.name)}
      </text>
    </g>
  );
}

function FrameOutline({ frame: [x, y, width, height], className }: { frame: Frame; className: string }) {
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

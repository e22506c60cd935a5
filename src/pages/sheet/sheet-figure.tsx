import { apiUrl } from '#client/lib/http.ts';
import type { LineKind, SheetPoint } from '#shared/contract/document.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import { type FigureLabel, placeFigureLabels } from '#shared/text/calculation-sheet/figure-labels.ts';
import type { SectionFigure } from '#shared/text/calculation-sheet/section-figure.ts';

/** Colour and dash of each kind, dashes in thousandths of the figure's width. */
const LOOKS: Record<LineKind, { colour: string; width: number; dash: readonly number[] }> = {
  equipotential: { colour: 'var(--color-equipotential)', width: 1.6, dash: [] },
  flowLine: { colour: 'var(--color-flow-line)', width: 1.6, dash: [16, 3] },
  phreaticLine: { colour: 'var(--color-phreatic)', width: 2, dash: [7, 4] },
  submergedFace: { colour: 'var(--color-equipotential)', width: 2.8, dash: [] },
  outflowFace: { colour: 'var(--color-equipotential)', width: 2.8, dash: [3, 4] },
  drain: { colour: 'var(--color-boundary)', width: 2.3, dash: [6, 3] },
  impervious: { colour: 'var(--color-boundary)', width: 2, dash: [] },
  ground: { colour: 'var(--color-boundary)', width: 1.4, dash: [] },
  soilBoundary: { colour: 'var(--color-boundary)', width: 1.4, dash: [9, 3, 2, 3] },
};
/** Enough for a print of the screen's page. */
const WANTED_PX = 1800;

/** The section with its traces over the scan, as on the first page of the PDF. */
export function SheetFigure({
  figure,
  sheet,
  label,
}: {
  figure: SectionFigure;
  sheet: SheetDto;
  label: string;
}) {
  const { crop } = figure;
  const unit = crop[2] / 1000;
  const path = (points: readonly SheetPoint[]) => points.map((point) => point.join(',')).join(' ');
  return (
    <figure className="m-0">
      <svg
        viewBox={crop.join(' ')}
        role="img"
        aria-label={label}
        className="block h-auto w-full border border-ink bg-white"
      >
        <Tiles sheet={sheet} crop={crop} />
        {figure.lines.map(({ id, kind, points }) => (
          <polyline
            key={id}
            points={path(points)}
            fill="none"
            stroke={LOOKS[kind].colour}
            strokeWidth={LOOKS[kind].width * unit}
            strokeDasharray={LOOKS[kind].dash.map((length) => length * unit).join(' ')}
          />
        ))}
        {figure.profiles.map((profile) => (
          <polyline
            key={path(profile)}
            points={path(profile)}
            fill="none"
            stroke="var(--color-point)"
            strokeWidth={1.4 * unit}
          />
        ))}
        {figure.knownPoints.map(({ name, at: [x, y] }) => (
          <path
            key={`${name} ${x} ${y}`}
            d={`M${x - 7 * unit} ${y}h${14 * unit}m${-7 * unit} ${-7 * unit}v${14 * unit}`}
            stroke="var(--color-ink)"
            strokeWidth={1.2 * unit}
          />
        ))}
        {figure.points.map(({ name, at }) => (
          <circle
            key={`${name} ${at.join()}`}
            cx={at[0]}
            cy={at[1]}
            r={4 * unit}
            fill="none"
            stroke="var(--color-point)"
            strokeWidth={1.6 * unit}
          />
        ))}
        <Labels figure={figure} unit={unit} />
      </svg>
    </figure>
  );
}

/** Size of the letters in thousandths of the figure's width, and about what a letter of a name is wide; figures are narrower. */
const LETTERS = 13;
const LETTER_WIDTH = 0.66;

function Labels({ figure, unit }: { figure: SectionFigure; unit: number }) {
  const labels = placeFigureLabels(figure, {
    scale: 1 / unit,
    letters: LETTERS,
    widthOf: (text) => text.length * LETTER_WIDTH * LETTERS,
  });
  const [left, top] = figure.crop;
  return labels.map((label) => (
    <text
      key={`${label.left} ${label.top}`}
      x={left + (label.left + label.width / 2) * unit}
      y={top + label.baseLine * unit}
      textAnchor="middle"
      fontSize={LETTERS * unit}
      fill={labelColour(label.of)}
      stroke="white"
      strokeWidth={3 * unit}
      paintOrder="stroke"
    >
      {label.text}
    </text>
  ));
}

function labelColour(of: FigureLabel['of']): string {
  if (of === 'point') return 'var(--color-point)';
  return of === 'knownPoint' ? 'var(--color-ink)' : LOOKS[of].colour;
}

/** The tiles of the coarsest level that is fine enough, as far as they meet the part that is shown. */
function Tiles({ sheet, crop }: { sheet: SheetDto; crop: SectionFigure['crop'] }) {
  const { rendition, tileSizePx, maxZoom, readyZoom = maxZoom } = sheet.tiles;
  const levels = Array.from({ length: readyZoom + 1 }, (_, level) => level);
  const zoom = levels.find((level) => crop[2] / 2 ** (maxZoom - level) >= WANTED_PX) ?? readyZoom;
  const size = tileSizePx * 2 ** (maxZoom - zoom);
  const range = (from: number, length: number, most: number) => {
    const first = Math.floor(from / size);
    const last = Math.ceil(Math.min(from + length, most) / size);
    return Array.from({ length: Math.max(0, last - first) }, (_, i) => first + i);
  };
  return range(crop[1], crop[3], sheet.heightPx).flatMap((row) =>
    range(crop[0], crop[2], sheet.widthPx).map((column) => (
      <image
        key={`${column} ${row}`}
        href={apiUrl(`/sheets/${sheet.id}/tiles/${rendition}/${zoom}/${column}_${row}`)}
        x={column * size}
        y={row * size}
        width={Math.min(size, sheet.widthPx - column * size)}
        height={Math.min(size, sheet.heightPx - row * size)}
        preserveAspectRatio="none"
      />
    )),
  );
}

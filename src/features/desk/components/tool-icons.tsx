import type { PaletteTool } from '#client/text/desk-palette.ts';

/** The small pictures beside the tools that draw; the others have none. */
export function ToolIcon({ tool }: { tool: PaletteTool }) {
  const picture = PICTURES[tool];
  if (picture === undefined) return null;
  return (
    <svg width="16" height="16" viewBox="0 0 16 16" fill="none" aria-hidden="true" className="shrink-0">
      {picture}
    </svg>
  );
}

const PICTURES: Partial<Record<PaletteTool, React.ReactNode>> = {
  equipotential: <path d="M2 14C6 10 9 6 14 2" strokeWidth="2" className="stroke-equipotential" />,
  flowLine: <path d="M2 3c6 0 11 5 12 11" strokeWidth="2" className="stroke-flow-line" />,
  phreaticLine: (
    <path d="M1 4c7 0 12 3 14 9" strokeWidth="2" strokeDasharray="4 2" className="stroke-phreatic" />
  ),
  boundary: (
    <g className="stroke-boundary">
      <path d="M1 11h14" strokeWidth="2" />
      <path d="M4 11l-2 3M9 11l-2 3M14 11l-2 3" />
    </g>
  ),
  profile: (
    <g className="stroke-point">
      <path d="M1 4h14" strokeWidth="2" />
      <path d="M2 4v4M6 4v8M10 4v6M14 4v3" />
    </g>
  ),
  readingPoint: <circle cx="8" cy="8" r="4" strokeWidth="2" className="stroke-point" />,
};

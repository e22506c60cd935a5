import type { LineKind } from '#shared/contract/document.ts';

/** Tools of the palette. Panning needs none: it goes on under every tool. */
export type ToolId =
  | 'select'
  | 'knownPoint'
  | 'equipotential'
  | 'flowLine'
  | 'phreaticLine'
  | 'boundary'
  | 'readingPoint'
  | 'profile'
  | 'soilPlace'
  | 'ruler'
  | 'note';

/** What the boundary tool draws: a kind of line, and for a submerged face whose level it carries. */
export type BoundaryKind =
  | 'impervious'
  | 'soilBoundary'
  | 'ground'
  | 'headwaterFace'
  | 'tailwaterFace'
  | 'outflowFace'
  | 'drain';

export const BOUNDARY_KINDS: readonly BoundaryKind[] = [
  'headwaterFace',
  'tailwaterFace',
  'outflowFace',
  'drain',
  'impervious',
  'ground',
  'soilBoundary',
];

export type LineChoice = { readonly line: LineKind; readonly water: 'headwater' | 'tailwater' | null };

const BOUNDARY_CHOICES: Record<BoundaryKind, LineChoice> = {
  impervious: { line: 'impervious', water: null },
  soilBoundary: { line: 'soilBoundary', water: null },
  ground: { line: 'ground', water: null },
  headwaterFace: { line: 'submergedFace', water: 'headwater' },
  tailwaterFace: { line: 'submergedFace', water: 'tailwater' },
  outflowFace: { line: 'outflowFace', water: null },
  drain: { line: 'drain', water: null },
};

/** The line a tool draws; null for a tool that draws none. */
export function lineChoiceOf(tool: ToolId, boundary: BoundaryKind): LineChoice | null {
  if (tool === 'boundary') return BOUNDARY_CHOICES[boundary];
  if (tool === 'equipotential' || tool === 'flowLine' || tool === 'phreaticLine') {
    return { line: tool, water: null };
  }
  return null;
}

/** The tool with which a line of some kind is continued. */
export function toolForLine(choice: LineChoice): { tool: ToolId; boundary: BoundaryKind | null } {
  if (choice.line === 'equipotential' || choice.line === 'flowLine' || choice.line === 'phreaticLine') {
    return { tool: choice.line, boundary: null };
  }
  const boundary = BOUNDARY_KINDS.find((kind) => {
    const drawn = BOUNDARY_CHOICES[kind];
    return drawn.line === choice.line && (drawn.line !== 'submergedFace' || drawn.water === choice.water);
  });
  return { tool: 'boundary', boundary: boundary ?? 'impervious' };
}

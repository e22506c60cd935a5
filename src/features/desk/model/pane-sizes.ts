import * as z from 'zod/mini';

/** The panes about the sheet: tools at the left, tables below it, notes and title block at the right. */
export const PANE_IDS = ['tools', 'figures', 'margin'] as const;
export type PaneId = (typeof PANE_IDS)[number];

export type PaneSize = { readonly px: number | null; readonly folded: boolean };
/**
 * What one person has made of the panes; `px` null = the usual size. Here and below pixels are those at the usual size of
 * letters: panes grow with the letters in them.
 */
export type PaneSizes = Readonly<Record<PaneId, PaneSize>>;
export type WindowSize = { readonly widthPx: number; readonly heightPx: number };
export type PaneRange = { readonly least: number; readonly most: number; readonly usual: number };

const USUAL: PaneSize = { px: null, folded: false };
export const USUAL_PANES: PaneSizes = { tools: USUAL, figures: USUAL, margin: USUAL };

/** The sheet keeps at least this much of the window. */
const LEAST_SHEET_PX = { across: 320, down: 160 };
const LEAST_PX: Readonly<Record<PaneId, number>> = { tools: 120, figures: 88, margin: 240 };
const MOST_TOOLS_PX = 320;
/** Part of a low window that the figures take at most unless somebody wants them larger. */
const MOST_USUAL_FIGURES = 0.32;
/** Height of the bar over the desk. */
const BAR_PX = 47;

const keptSize = z.object({ px: z.nullable(z.number().check(z.gte(0), z.lte(10_000))), folded: z.boolean() });
const keptSizes = z.object({ tools: keptSize, figures: keptSize, margin: keptSize });

/** What was kept as text; anything else than sizes gives the usual ones. */
export function parsePanes(kept: string | null): PaneSizes {
  try {
    const parsed = z.safeParse(keptSizes, JSON.parse(kept ?? 'null'));
    return parsed.success ? parsed.data : USUAL_PANES;
  } catch {
    return USUAL_PANES;
  }
}

/** How small and how large a pane may be in a window of this size beside the others, and how large it usually is. */
export function paneRange(pane: PaneId, window: WindowSize, sizes: PaneSizes): PaneRange {
  const usual = usualPx(pane, window);
  const least = LEAST_PX[pane];
  if (pane === 'figures') {
    return ranged(least, window.heightPx - BAR_PX - LEAST_SHEET_PX.down, usual);
  }
  const other = pane === 'tools' ? 'margin' : 'tools';
  const taken = sizes[other].folded
    ? 0
    : Math.max(LEAST_PX[other], sizes[other].px ?? usualPx(other, window));
  const room = window.widthPx - LEAST_SHEET_PX.across - taken;
  return ranged(least, pane === 'tools' ? Math.min(MOST_TOOLS_PX, room) : room, usual);
}

function ranged(least: number, most: number, usual: number): PaneRange {
  const top = Math.max(least, most);
  return { least, most: top, usual: Math.min(top, Math.max(least, usual)) };
}

/** The sizes that suit the widths of the window named in the styles. */
function usualPx(pane: PaneId, { widthPx, heightPx }: WindowSize): number {
  // Upright the heads and buttons of the tables take several rows, and there is height enough for the figures too.
  if (pane === 'figures') return Math.min(heightPx > widthPx ? 344 : 232, MOST_USUAL_FIGURES * heightPx);
  if (pane === 'tools') return widthPx < 1080 ? 168 : 188;
  // On a tablet held upright the sheet would otherwise be as narrow as the notes.
  if (widthPx < 960) return 288;
  return widthPx < 1080 ? 320 : widthPx < 1360 ? 340 : 372;
}

/** Pixels that a pane takes now; 0 when it is folded. */
export function panePx(pane: PaneId, window: WindowSize, sizes: PaneSizes): number {
  const { px, folded } = sizes[pane];
  const { least, most, usual } = paneRange(pane, window, sizes);
  return folded ? 0 : Math.round(Math.min(most, Math.max(least, px ?? usual)));
}

/** A pane at another size, kept within its range; a pane that is resized is no longer folded. */
export function resizedPane(sizes: PaneSizes, pane: PaneId, px: number, window: WindowSize): PaneSizes {
  const { least, most } = paneRange(pane, window, sizes);
  return { ...sizes, [pane]: { px: Math.min(most, Math.max(least, Math.round(px))), folded: false } };
}

/** A pane dragged to less than half of its least size folds, and keeps the size that it had. */
export function draggedPane(sizes: PaneSizes, pane: PaneId, px: number, window: WindowSize): PaneSizes {
  if (px < LEAST_PX[pane] / 2) return foldedPane(sizes, pane, true);
  return resizedPane(sizes, pane, px, window);
}

export function foldedPane(sizes: PaneSizes, pane: PaneId, folded: boolean): PaneSizes {
  if (sizes[pane].folded === folded) return sizes;
  return { ...sizes, [pane]: { ...sizes[pane], folded } };
}

export function usualPane(sizes: PaneSizes, pane: PaneId): PaneSizes {
  return { ...sizes, [pane]: USUAL };
}

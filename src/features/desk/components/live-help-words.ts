import { liveHelpText as text } from '#client/text/tracing-aids.ts';
import { elevationUnit } from '#shared/text/unit-text.ts';
import type { DeskState } from '../model/desk-state.ts';
import type { LiveHelp } from '../model/live-help.ts';
import type { HeadThere, HelpShown } from '../model/live-help-source.ts';

type Read = Pick<DeskState, 'document' | 'reading' | 'documentRevision'>;

/**
 * What is told of a place while a line is drawn, a line of words for each fact. `place`: its offset and elevation.
 * `awaited`: what stands in place of a head that has not been worked out yet.
 */
export function helpWords(
  shown: HelpShown,
  place: readonly string[],
  read: Read,
  awaited: readonly string[] = [],
): string[] {
  const words = [
    ...(shown.snap === null ? [] : [text.snaps[shown.snap]]),
    ...place,
    ...(shown.head === null ? awaited : headWords(shown.head, read)),
    ...angleWords(shown.help),
    ...cellWords(shown.help),
  ];
  // Two lines met alike say the same.
  return [...new Set(words)];
}

/** The head with the lines it lies between, and of which net it is. */
export function headWords(there: HeadThere | null, { document, reading, documentRevision }: Read): string[] {
  if (there === null) return [];
  if (there.head === null) return [text.noHead];
  const unit = elevationUnit(document.unitSystem, document.datum);
  const headOf = (id: string) => reading?.lines.find((line) => line.id === id)?.head ?? null;
  const { before, after } = there.head.between;
  return [
    text.head(there.head.totalHead, unit),
    text.between(headOf(before), headOf(after), there.of === documentRevision),
  ];
}

/** Angles that should be right ones; only where there is none of them the nearest other. */
function angleWords({ meetings }: LiveHelp): string[] {
  const judged = meetings.filter(({ wantsRight }) => wantsRight);
  const told = judged.length > 0 ? judged : meetings.slice(0, 1);
  return told.map(({ kind, angleDeg, wantsRight }) => text.angle(angleDeg, kind, wantsRight));
}

function cellWords({ cells, wantedRatio }: LiveHelp): string[] {
  if (cells.length === 0) return [];
  const ratios = cells.map(({ ratio, side }) => text.cellSide(ratio, cells.length > 1 ? side : null));
  return [text.cells(ratios, wantedRatio)];
}

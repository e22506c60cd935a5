import { useStore } from 'zustand';
import { fixedText, plainText } from '#client/lib/figures.ts';
import { deskPaletteText as text } from '#client/text/desk-palette.ts';
import { deskToolText } from '#client/text/desk-tools.ts';
import { drawingWayText } from '#client/text/drawing-ways.ts';
import { editingText } from '#client/text/editing-lines.ts';
import { profileText } from '#client/text/profiles.ts';
import { elevationUnit } from '#shared/text/unit-text.ts';
import { type ClickedPlaces, clickedPlacesOf } from '../model/clicked-places.ts';
import type { DeskState, DeskStore } from '../model/desk-state.ts';
import { type DrawingWay, drawingWayChoice } from '../model/drawing-way.ts';
import { lineChoiceOf } from '../model/tool-choice.ts';

/** What the tool in hand does now, in sentences. */
export function ToolHint({ store }: { store: DeskStore }) {
  const way = useStore(drawingWayChoice, (choice) => choice.way);
  const sentences = useStore(store, (state) => hintOf(state, clickedPlacesOf(store), way));
  return (
    <div role="status" className="mx-4 mt-3 min-h-[92px] shrink-0 text-sm text-ink-2">
      {sentences.split('\n').map((sentence) => (
        <p key={sentence} className="m-0 mb-1.5">
          {sentence}
        </p>
      ))}
    </div>
  );
}

/** The hint as lines of one text, so that it is drawn again only when it says something else. */
function hintOf(state: DeskState, clicked: ClickedPlaces, way: DrawingWay): string {
  if (state.readOnly) return text.readOnly;
  const drawn = state.draft === null ? undefined : state.document.entities[state.draft.lineId]?.value;
  if (drawn?.kind === 'line') {
    // A smooth line has many vertices; what counts for the hand are the clicks.
    const count = clicked.among(state.draft?.lineId ?? '', drawn.points).size || drawn.points.length;
    const kind = deskToolText.lineKind(drawn.line);
    return `${text.tracing(kind, count)}\n${text.tracingKeys}\n${drawingWayText.hints[way]}`;
  }
  if (drawn?.kind === 'profile' && drawn.place.on === 'sheet') {
    return `${text.tracing(profileText.drawn, drawn.place.points.length)}\n${text.tracingKeys}`;
  }
  if (lineChoiceOf(state.tool, state.boundaryKind) !== null) {
    return `${text.hints[state.tool]}\n${drawingWayText.hints[way]}`;
  }
  if (state.pendingEdit !== null) return `${editingText.asks[state.pendingEdit.op]}\n${editingText.leaveKey}`;
  if (state.selection.kind === 'several' && state.tool === 'select') return editingText.form.hint;
  return chosenLineHint(state) ?? text.hints[state.tool];
}

function chosenLineHint(state: DeskState): string | null {
  const id =
    state.selection.kind === 'line' && state.selection.ids.length === 1 ? state.selection.ids[0] : undefined;
  const line = id === undefined ? undefined : state.document.entities[id]?.value;
  if (state.tool !== 'select' || line?.kind !== 'line') return null;
  if (!line.finished) return text.unfinishedLine(deskToolText.lineKind(line.line));
  const read = state.reading?.lines.find((found) => found.id === id);
  const facts = [text.chosenLine(deskToolText.lineWord(line))];
  if (read?.drops != null) facts.push(text.chosenDrops(plainText(read.drops)));
  if (read?.head != null) {
    const unit = elevationUnit(state.document.unitSystem, state.document.datum);
    facts.push(text.chosenHead(fixedText(read.head, 2), unit));
  }
  return `${facts.join(' ')}\n${text.chosenKeys}`;
}

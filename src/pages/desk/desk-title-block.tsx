import { useMemo } from 'react';
import { useNavigate } from 'react-router-dom';
import { useStore } from 'zustand';
import { FORM_OF_CELL } from '#client/features/desk/components/cell-steps.ts';
import { TitleBlock } from '#client/features/desk/components/title-block.tsx';
import { type CellId, titleBlockCells } from '#client/features/desk/components/title-block-cells.ts';
import { flowUnitChoice } from '#client/features/desk/model/flow-unit.ts';
import type { DeskSession } from '#client/features/desk/saving/desk-session.ts';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { paths } from '#client/lib/paths.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import { titleFactsOf } from './title-facts.ts';
import type { Margin } from './use-margin.ts';
import { useSavedAt } from './use-saved-at.ts';

/** The title block of the open net; a cell opens the form that does its step. */
export function DeskTitleBlock({
  detail,
  session,
  margin,
  onShow,
  notes,
}: {
  detail: NetDetailDto;
  session: DeskSession;
  margin: Margin;
  onShow: (margin: Margin) => void;
  notes: readonly NoteDto[];
}) {
  const navigate = useNavigate();
  const { person } = useSession();
  const document = useStore(session.store, (state) => state.document);
  const reading = useStore(session.store, (state) => state.reading);
  const stale = useStore(session.store, (state) => state.readingOf !== state.documentRevision);
  const flowUnit = useStore(flowUnitChoice, (state) => state.unit);
  const savedAt = useSavedAt(session.saving);
  const cells = useMemo(
    () => titleBlockCells(document, reading, { ...titleFactsOf(detail, person, savedAt), flowUnit }),
    [document, reading, detail, person, savedAt, flowUnit],
  );
  const step = (id: CellId) => {
    const form = FORM_OF_CELL[id];
    if (form) onShow({ shows: 'form', form });
    else if (id === 'dam') void navigate(paths.dam(detail.dam.id));
    else onShow({ shows: 'revisions' });
  };
  return (
    <TitleBlock
      cells={cells}
      stale={stale}
      open={openCell(margin)}
      onStep={step}
      notes={{
        openOn: (id) => openNotesOn(notes, id),
        onNote: detail.can.includes('note.write')
          ? (cell) => session.store.emitIntent({ type: 'writeNote', anchor: { on: 'titleBlock', cell } })
          : null,
        onOpen: (noteId) => session.store.emitIntent({ type: 'openNote', noteId }),
      }}
    />
  );
}

const openNotesOn = (notes: readonly NoteDto[], cell: CellId) =>
  notes.filter(
    ({ anchor, state }) => state !== 'closed' && anchor.on === 'titleBlock' && anchor.cell === cell,
  );

/** The first cell whose form is open: several cells share one form. */
function openCell(margin: Margin): CellId | null {
  if (margin.shows !== 'form') return null;
  const cells = Object.keys(FORM_OF_CELL) as CellId[];
  return cells.find((cell) => FORM_OF_CELL[cell]?.form === margin.form.form) ?? null;
}

import type { PictureFacts } from '#client/features/desk/components/picture-plan.ts';
import { titleBlockCells } from '#client/features/desk/components/title-block-cells.ts';
import { flowUnitChoice } from '#client/features/desk/model/flow-unit.ts';
import type { DeskSession } from '#client/features/desk/saving/desk-session.ts';
import { formatMoment } from '#client/lib/dates.ts';
import { pictureText as text } from '#client/text/picture.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import { cleanFileName } from '#shared/text/file-name.ts';
import { titleFactsOf } from './title-facts.ts';

/** The title block of a picture of the open net: its cells on the desk, and which drawing, load case and state it shows. */
export function pictureFactsOf(
  detail: NetDetailDto,
  session: DeskSession,
  person: { id: string; name: string } | null,
  drawingName: string,
): PictureFacts {
  const { document, reading } = session.store.getState();
  const savedAt = session.saving?.state.getState().savedAt ?? null;
  const facts = { ...titleFactsOf(detail, person, savedAt), flowUnit: flowUnitChoice.getState().unit };
  const told = titleBlockCells(document, reading, facts).filter(
    ({ id }) => id !== 'scale' && id !== 'calculation',
  );
  const [section, ...rest] = told.map(({ label, value }) => ({ label, value }));
  return {
    cells: [
      section!,
      ...rest.slice(0, 1),
      { label: text.cells.drawing, value: [drawingName] },
      { label: text.cells.net, value: [detail.net.name] },
      ...rest.slice(1),
      { label: text.cells.state, value: [stateText(detail.net)] },
      { label: text.cells.made, value: [formatMoment(new Date().toISOString())] },
    ],
    fileName: cleanFileName(`${drawingName} ${detail.section.name} ${detail.net.name}.png`),
  };
}

function stateText({ state, revisionLabel, changedSinceRevision }: NetDetailDto['net']): string {
  if (state === 'draft' || revisionLabel === null) return text.states.draft;
  return changedSinceRevision ? text.states.changed(revisionLabel) : text.states[state](revisionLabel);
}

import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { Actions, Dialog } from '#client/components/dialog.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { shortName } from '#client/lib/initials.ts';
import { commonText } from '#client/text/common.ts';
import { savingText as text } from '#client/text/saving.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { canKeepBoth } from '../model/conflict-copy.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { Conflict } from '../model/shared-edits.ts';
import type { ConflictChoice, Saving } from '../saving/saving.ts';
import { conflictFacts } from './conflict-facts.ts';
import { ConflictPicture } from './conflict-picture.tsx';

interface ConflictDialogProps {
  store: DeskStore;
  saving: Saving;
  onClose: () => void;
}

/** Both versions of everything two people changed at the same time, for the person to choose. */
export function ConflictDialog({ store, saving, onClose }: ConflictDialogProps) {
  const conflicts = Object.values(useStore(store, (state) => state.conflicts));
  const document = useStore(store, (state) => state.document);
  return (
    <Dialog title={text.compareTitle} onClose={onClose} wide>
      <p className="mt-0 mb-3 text-ink-2">{conflicts.length === 0 ? text.allSettled : text.compareLead}</p>
      <ul className="m-0 flex list-none flex-col gap-4 p-0">
        {conflicts.map((conflict) => (
          <li key={conflict.entityId}>
            <Versions
              conflict={conflict}
              document={document}
              onKeep={(keep) => saving.settle(conflict.entityId, keep)}
            />
          </li>
        ))}
      </ul>
      <Actions>
        <Button onClick={onClose}>{commonText.close}</Button>
      </Actions>
    </Dialog>
  );
}

function Versions({
  conflict,
  document,
  onKeep,
}: {
  conflict: Conflict;
  document: FlowNetDocument;
  onKeep: (keep: ConflictChoice) => void;
}) {
  const name = conflict.changedBy ? shortName(conflict.changedBy.name) : null;
  const thing = text.things[(conflict.mine ?? conflict.theirs)?.kind ?? 'line'];
  return (
    <div className="border border-rule">
      <ConflictPicture conflict={conflict} document={document} />
      <Table caption={thing}>
        <thead>
          <tr>
            <HeadCell>{text.fact}</HeadCell>
            <HeadCell>{text.mine}</HeadCell>
            <HeadCell>{text.changedBy(name)}</HeadCell>
          </tr>
        </thead>
        <tbody>
          {conflictFacts(conflict.mine, conflict.theirs).map((fact) => (
            <tr key={fact.name}>
              <Cell>{fact.name}</Cell>
              <Cell className="max-w-[17.5rem] break-words">{fact.mine}</Cell>
              <Cell className="max-w-[17.5rem] break-words">{fact.theirs}</Cell>
            </tr>
          ))}
        </tbody>
      </Table>
      <div className="flex flex-wrap gap-2 p-2">
        <Button onClick={() => onKeep('theirs')}>{text.keepTheirs(name)}</Button>
        <Button onClick={() => onKeep('mine')}>{text.putMine}</Button>
        {canKeepBoth(conflict) ? <Button onClick={() => onKeep('both')}>{text.keepBoth}</Button> : null}
      </div>
    </div>
  );
}

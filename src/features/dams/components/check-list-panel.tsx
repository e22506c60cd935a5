import { useSuspenseQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { v7 as newId } from 'uuid';
import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { checkListSettingsText as text } from '#client/text/check-work.ts';
import { commonText } from '#client/text/common.ts';
import type { CheckListItem } from '#shared/contract/check-list.ts';
import { MAX_CHECK_LIST_ITEMS } from '#shared/contract/check-list.ts';
import { checkListQuery, useSetCheckList } from '../api/check-list-query.ts';
import { CheckListRow } from './check-list-row.tsx';

/** What the dam's reviewers answer, edited by who may change the dam's settings. */
export function CheckListPanel({ damId, canEdit }: { damId: string; canEdit: boolean }) {
  const { data: list } = useSuspenseQuery(checkListQuery(damId));
  if (!canEdit)
    return (
      <ol className="m-0 flex flex-col gap-1 pl-5">
        {list.items.map(({ id, text: words }) => (
          <li key={id} className="break-words">
            {words}
          </li>
        ))}
      </ol>
    );
  // Another list begins afresh, so that what was saved or put back is what is edited.
  return (
    <CheckListForm key={JSON.stringify(list.items)} damId={damId} items={list.items} isUsual={list.isUsual} />
  );
}

interface CheckListFormProps {
  damId: string;
  items: readonly CheckListItem[];
  isUsual: boolean;
}

function CheckListForm({ damId, items, isUsual }: CheckListFormProps) {
  const [edited, setEdited] = useState(items);
  const [isTried, setTried] = useState(false);
  const save = useSetCheckList(damId);
  const notice = useNotice();
  const isChanged = JSON.stringify(edited) !== JSON.stringify(items);
  const set = (next: readonly CheckListItem[] | null) =>
    save.mutate(next?.map(({ id, text: words }) => ({ id, text: words.trim() })) ?? null, {
      onSuccess: () => notice(text.saved),
    });
  const submit = () => {
    setTried(true);
    if (edited.every((item) => item.text.trim() !== '')) set(edited);
  };
  return (
    <div className="flex flex-col gap-2">
      <p className="m-0 text-ink-2">{text.lead}</p>
      {isUsual ? <p className="m-0 text-ink-2">{text.usual}</p> : null}
      {edited.length === 0 ? <p className="m-0">{text.empty}</p> : null}
      <ol className="m-0 list-none border-t border-rule p-0">
        {edited.map((item, i) => (
          <CheckListRow
            key={item.id}
            number={i + 1}
            item={item}
            error={isTried && item.text.trim() === '' ? text.emptyItem : null}
            onChange={(words) =>
              setEdited(edited.map((each) => (each.id === item.id ? { ...each, text: words } : each)))
            }
            onUp={i === 0 ? null : () => setEdited(movedUp(edited, i))}
            onRemove={() => setEdited(edited.filter(({ id }) => id !== item.id))}
          />
        ))}
      </ol>
      <div>
        <Button
          look="quiet"
          disabled={edited.length >= MAX_CHECK_LIST_ITEMS}
          onClick={() => setEdited([...edited, { id: newId(), text: '' }])}
        >
          {text.add}
        </Button>
      </div>
      {isChanged ? <p className="m-0 text-sm text-ink-2">{text.changedNote}</p> : null}
      <ProblemNote error={save.error} />
      <div className="flex flex-wrap gap-2">
        <Button disabled={!isChanged} busy={save.isPending} busyLabel={commonText.saving} onClick={submit}>
          {text.save}
        </Button>
        {isChanged ? (
          <Button look="quiet" onClick={() => setEdited(items)}>
            {text.discard}
          </Button>
        ) : null}
        {isUsual ? null : (
          <Button look="quiet" busy={save.isPending} onClick={() => set(null)}>
            {text.putBack}
          </Button>
        )}
      </div>
    </div>
  );
}

function movedUp(items: readonly CheckListItem[], i: number): CheckListItem[] {
  const next = [...items];
  const [moved] = next.splice(i, 1);
  if (moved) next.splice(i - 1, 0, moved);
  return next;
}

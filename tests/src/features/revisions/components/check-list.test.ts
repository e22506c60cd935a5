import { expect, it } from 'vitest';
import { changedDraft } from '#client/features/revisions/api/use-check-draft.ts';
import { gapsOf } from '#client/features/revisions/components/check-list.tsx';

const items = [
  { id: 'datum', text: 'The datum is named.' },
  { id: 'drops', text: 'Counted again.' },
];
const answered = (itemId: string, answer: 'yes' | 'no' | null, remark = '') => ({ itemId, answer, remark });

it('an acceptance lacks what is not answered, and a remark where the answer is no', () => {
  expect(gapsOf(items, [])).toEqual({ unanswered: 2, bare: 0 });
  const half = [answered('datum', 'no'), answered('drops', null, 'Later.')];
  expect(gapsOf(items, half)).toEqual({ unanswered: 1, bare: 1 });
  expect(gapsOf(items, [answered('datum', 'no', 'As agreed.'), answered('drops', 'yes')])).toEqual({
    unanswered: 0,
    bare: 0,
  });
  expect(gapsOf([], [])).toEqual({ unanswered: 0, bare: 0 });
});

it('a change touches only what it names', () => {
  const draft = { ticks: ['a', 'b'], answers: [answered('datum', 'yes')] };
  expect(changedDraft(draft, { ticked: ['c', 'a'] }).ticks).toEqual(['a', 'b', 'c']);
  expect(changedDraft(draft, { unticked: ['a'] })).toEqual({ ...draft, ticks: ['b'] });
  const next = changedDraft(draft, { answers: [answered('drops', 'no'), answered('datum', null)] });
  expect(next.answers).toEqual([answered('datum', null), answered('drops', 'no')]);
  expect(next.ticks).toEqual(draft.ticks);
});

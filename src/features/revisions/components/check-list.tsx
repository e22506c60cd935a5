import { useId, useState } from 'react';
import { inputClass } from '#client/components/field.tsx';
import { checkWorkText as text } from '#client/text/check-work.ts';
import type { CheckAnswer, CheckListAnswer, CheckListItem } from '#shared/contract/check-list.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';
import { useCheckWork } from './check-work.tsx';

const ANSWERS: readonly CheckAnswer[] = ['yes', 'no', 'notApplicable'];

/** Items without an answer, and those answered with no that say no reason. */
export function gapsOf(items: readonly CheckListItem[], answers: readonly CheckListAnswer[]) {
  const held = new Map(answers.map((each) => [each.itemId, each]));
  return {
    unanswered: items.filter(({ id }) => (held.get(id)?.answer ?? null) === null).length,
    bare: items.filter(({ id }) => held.get(id)?.answer === 'no' && held.get(id)?.remark === '').length,
  };
}

/** The dam's check list with the reader's answers. */
export function CheckList() {
  const work = useCheckWork();
  if (work === null) return null;
  const { checkList: items, draft } = work;
  const { answers } = draft;
  const onAnswer = (answer: CheckListAnswer) => work.change({ answers: [answer] });
  const { unanswered } = gapsOf(items, answers);
  return (
    <section aria-labelledby="check-list" className="border-t border-rule px-3 py-2">
      <div className="flex flex-wrap items-baseline gap-x-2">
        <h2 id="check-list" className="m-0 text-base font-bold">
          {text.list}
        </h2>
        {items.length > 0 ? (
          <output className="ml-auto tabular-nums">
            {text.answered(items.length - unanswered, items.length)}
          </output>
        ) : null}
      </div>
      {items.length === 0 ? <p className="m-0 text-ink-2">{text.listEmpty}</p> : null}
      <ol className="m-0 list-none p-0">
        {items.map((item) => (
          <Item
            // Words that were changed make another item.
            key={item.id}
            item={item}
            held={answers.find(({ itemId }) => itemId === item.id) ?? null}
            onAnswer={onAnswer}
          />
        ))}
      </ol>
      <p className="m-0 mt-1 text-sm text-ink-2">{text.kept}</p>
    </section>
  );
}

function Item({
  item,
  held,
  onAnswer,
}: {
  item: CheckListItem;
  held: CheckListAnswer | null;
  onAnswer: (answer: CheckListAnswer) => void;
}) {
  const group = useId();
  const [isRemarking, setRemarking] = useState(false);
  const [typed, setTyped] = useState<string | null>(null);
  const answer = held?.answer ?? null;
  const remark = held?.remark ?? '';
  const shows = isRemarking || remark !== '' || answer === 'no';
  const keep = () => {
    if (typed !== null && typed.trim() !== remark)
      onAnswer({ itemId: item.id, answer, remark: typed.trim() });
    setTyped(null);
  };
  return (
    <li className="border-b border-rule-2 py-1.5 last:border-b-0">
      <fieldset className="m-0 min-w-0 border-0 p-0">
        <legend className="p-0 break-words">{item.text}</legend>
        <div className="mt-1 flex flex-wrap items-center gap-x-3 gap-y-0.5">
          {ANSWERS.map((each) => (
            <label key={each} className="touch inline-flex cursor-pointer items-center gap-1.5">
              <input
                type="radio"
                name={group}
                className="size-[0.875rem] shrink-0 accent-ink pointer-coarse:size-5"
                checked={answer === each}
                onChange={() => onAnswer({ itemId: item.id, answer: each, remark })}
              />
              {text.answers[each]}
            </label>
          ))}
          {shows ? null : (
            <button
              type="button"
              className="touch ml-auto text-sm text-ink-2 underline"
              onClick={() => setRemarking(true)}
            >
              {text.addRemark}
            </button>
          )}
        </div>
        {shows ? (
          <input
            className={`${inputClass(false)} mt-1`}
            aria-label={text.remarkOn(item.text)}
            placeholder={answer === 'no' ? text.noNeedsRemark : text.remark}
            maxLength={MAX_NOTE_LENGTH}
            value={typed ?? remark}
            onChange={(event) => setTyped(event.target.value)}
            onBlur={keep}
          />
        ) : null}
      </fieldset>
    </li>
  );
}

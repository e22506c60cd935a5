import { buttonClass } from '#client/components/button.tsx';
import { inputClass } from '#client/components/field.tsx';
import { checkListSettingsText as text } from '#client/text/check-work.ts';
import { type CheckListItem, MAX_CHECK_ITEM_LENGTH } from '#shared/contract/check-list.ts';

interface CheckListRowProps {
  number: number;
  item: CheckListItem;
  error: string | null;
  onChange: (words: string) => void;
  /** Null for the first. */
  onUp: (() => void) | null;
  onRemove: () => void;
}

/** One item of the list as it is edited. */
export function CheckListRow({ number, item, error, onChange, onUp, onRemove }: CheckListRowProps) {
  return (
    <li className="grid grid-cols-[1.5rem_minmax(0,1fr)_auto] items-start gap-x-2 border-b border-rule-2 py-1.5">
      <span className="pt-1 text-right text-ink-2 tabular-nums">{number}</span>
      <div className="min-w-0">
        <textarea
          rows={2}
          aria-label={text.item(number)}
          aria-invalid={error ? true : undefined}
          className={`${inputClass(error !== null)} block field-sizing-content min-h-0 resize-y`}
          maxLength={MAX_CHECK_ITEM_LENGTH}
          value={item.text}
          onChange={(event) => onChange(event.target.value)}
        />
        {error ? <p className="m-0 text-sm text-wrong">{error}</p> : null}
      </div>
      <span className="flex gap-1">
        <button
          type="button"
          aria-label={text.upItem(number)}
          disabled={onUp === null}
          className={buttonClass('quiet', 'px-2 py-[2px] text-sm')}
          onClick={() => onUp?.()}
        >
          {text.up}
        </button>
        <button
          type="button"
          aria-label={text.removeItem(number)}
          className={buttonClass('quiet', 'px-2 py-[2px] text-sm')}
          onClick={onRemove}
        >
          {text.remove}
        </button>
      </span>
    </li>
  );
}

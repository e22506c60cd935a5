import { Cell } from '#client/components/table.tsx';
import { entityTableText as text } from '#client/text/entity-table.ts';

/** What can be done with a row; nothing is removed where `onRemove` is null. */
export function RowActions({
  whose,
  onShow,
  onRemove,
}: {
  whose: string;
  onShow: () => void;
  onRemove: (() => void) | null;
}) {
  return (
    <Cell className="whitespace-nowrap">
      <button
        type="button"
        aria-label={text.showNamed(whose)}
        className="touch mr-3 underline"
        onClick={onShow}
      >
        {text.show}
      </button>
      {onRemove === null ? null : (
        <button
          type="button"
          aria-label={text.removeNamed(whose)}
          className="touch text-wrong underline"
          onClick={({ currentTarget }) => removeRow(currentTarget, onRemove)}
        >
          {text.remove}
        </button>
      )}
    </Cell>
  );
}

/** The focus goes on to the row that follows, or comes before, instead of being lost with the button. */
function removeRow(button: HTMLElement, onRemove: () => void): void {
  const row = button.closest('tr');
  const neighbour = row?.nextElementSibling ?? row?.previousElementSibling;
  const next = [...(neighbour?.querySelectorAll('button') ?? [])].at(-1);
  const around = button.closest<HTMLElement>('dialog');
  onRemove();
  (next ?? around?.querySelector('button'))?.focus();
}

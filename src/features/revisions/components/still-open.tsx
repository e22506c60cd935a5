import { inputClass } from '#client/components/field.tsx';
import { sendingText as text } from '#client/text/revisions.ts';
import type { OpenItem } from '#shared/contract/before-sending.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';
import type { SendingDto } from '#shared/contract/revisions.ts';

/** Reasons by the key of the item. */
export type Reasons = Readonly<Record<string, string>>;

interface StillOpenProps {
  sending: SendingDto;
  reasons: Reasons;
  /** Marks the items without a reason, once sending was tried. */
  asked: boolean;
  onReasons: (reasons: Reasons) => void;
}

export const withoutReason = (open: readonly OpenItem[], reasons: Reasons) =>
  open.filter(({ key }) => (reasons[key] ?? '').trim() === '');

/** What is still open, each item with the reason why it stays; of an unfinished net, what it lacks. */
export function StillOpen({ sending, reasons, asked, onReasons }: StillOpenProps) {
  const { findings, open } = sending;
  const lacking = findings.filter(({ weight }) => weight !== 'note');
  return (
    <section>
      <h3 className="m-0 text-sm font-semibold">{text.missing}</h3>
      {lacking.length + open.length === 0 ? <p className="m-0">{text.nothingMissing}</p> : null}
      {lacking.length > 0 ? (
        <ul className="m-0 list-disc pl-5">
          {lacking.map((found) => (
            <li key={`${found.code} ${found.entityIds.join(' ')} ${found.text}`}>{found.text}</li>
          ))}
        </ul>
      ) : null}
      {open.length > 0 ? (
        <>
          <p className="m-0 text-ink-2">{text.openLead}</p>
          <ul className="m-0 mt-1 max-h-[40dvh] list-none overflow-y-auto border-t border-rule p-0">
            {open.map((item) => (
              <OpenRow
                key={item.key}
                item={item}
                reason={reasons[item.key] ?? ''}
                asked={asked}
                onReason={(reason) => onReasons({ ...reasons, [item.key]: reason })}
              />
            ))}
          </ul>
          <ReasonForRest open={open} reasons={reasons} onReasons={onReasons} />
        </>
      ) : null}
    </section>
  );
}

function OpenRow({
  item,
  reason,
  asked,
  onReason,
}: {
  item: OpenItem;
  reason: string;
  asked: boolean;
  onReason: (reason: string) => void;
}) {
  const wrong = asked && reason.trim() === '';
  return (
    <li className="flex flex-col gap-1 border-b border-rule-2 py-2">
      <span className="break-words">{item.text}</span>
      <input
        className={inputClass(wrong)}
        aria-label={text.reasonFor(item.text)}
        aria-invalid={wrong || undefined}
        placeholder={text.reasonHint}
        maxLength={MAX_NOTE_LENGTH}
        value={reason}
        onChange={(event) => onReason(event.target.value)}
      />
    </li>
  );
}

/** Many points may be open for one cause: the reason typed last is offered for all that have none. */
function ReasonForRest({
  open,
  reasons,
  onReasons,
}: Omit<StillOpenProps, 'sending' | 'asked'> & { open: OpenItem[] }) {
  const rest = withoutReason(open, reasons);
  const typed = open.map(({ key }) => (reasons[key] ?? '').trim()).findLast((reason) => reason !== '');
  if (rest.length === 0 || typed === undefined) return null;
  return (
    <button
      type="button"
      className="touch cursor-pointer border-0 bg-transparent p-0 py-1 text-left underline"
      onClick={() => onReasons({ ...reasons, ...Object.fromEntries(rest.map(({ key }) => [key, typed])) })}
    >
      {text.reasonForRest}
    </button>
  );
}

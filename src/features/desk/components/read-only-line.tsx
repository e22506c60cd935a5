import { useState } from 'react';
import { savingText as text } from '#client/text/saving.ts';
import type { ReadOnlyReason } from '../saving/desk-session.ts';

/** Says above the sheet why it cannot be changed here, and what can be done about it. */
export function ReadOnlyLine({
  reason,
  onTakeOver,
}: {
  reason: NonNullable<ReadOnlyReason>;
  onTakeOver: () => void;
}) {
  const [asked, setAsked] = useState(false);
  return (
    <p role="status" className="m-0 border-b border-rule bg-doubt px-3 py-1.5">
      {text[reason]}{' '}
      {reason === 'elsewhere' ? (
        <button
          type="button"
          className="touch underline underline-offset-2"
          disabled={asked}
          onClick={() => {
            setAsked(true);
            onTakeOver();
          }}
        >
          {asked ? text.takingOver : text.takeOver}
        </button>
      ) : null}
    </p>
  );
}

import { sendingText as text } from '#client/text/revisions.ts';
import type { SendingDto } from '#shared/contract/revisions.ts';

interface ReviewerChoiceProps {
  reviewers: SendingDto['reviewers'];
  chosen: readonly string[];
  fault: string | null;
  onChoose: (personIds: string[]) => void;
}

const toggled = (chosen: readonly string[], id: string) =>
  chosen.includes(id) ? chosen.filter((each) => each !== id) : [...chosen, id];

/** Reviewers of the dam; one or several check. Those who drew are shown, so that nobody looks for them, but cannot be chosen. */
export function ReviewerChoice({ reviewers, chosen, fault, onChoose }: ReviewerChoiceProps) {
  return (
    <fieldset className="m-0 border-0 p-0">
      <legend className="p-0 text-sm font-semibold">{text.reviewer}</legend>
      {reviewers.some((reviewer) => !reviewer.drew) ? null : (
        <p className="m-0 text-attention">{text.noReviewers}</p>
      )}
      {reviewers.map(({ person, email, drew }) => (
        <label key={person.id} className="touch flex items-center gap-2 py-1">
          <input
            type="checkbox"
            className="size-4 shrink-0 accent-ink"
            disabled={drew}
            checked={chosen.includes(person.id)}
            onChange={() => onChoose(toggled(chosen, person.id))}
          />
          <span className="min-w-0 break-words">
            {person.name} <span className="text-ink-2">{drew ? text.drew : email}</span>
          </span>
        </label>
      ))}
      {chosen.length > 1 ? <p className="m-0 text-sm text-ink-2">{text.allHaveToAccept}</p> : null}
      {fault ? (
        <p role="alert" className="m-0 text-sm text-wrong">
          {fault}
        </p>
      ) : null}
    </fieldset>
  );
}

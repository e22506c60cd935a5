import { formatMoment } from '#client/lib/dates.ts';
import { sentenceText } from '#client/lib/figures.ts';
import { checkWorkText as text } from '#client/text/check-work.ts';
import { checkText } from '#client/text/revisions.ts';
import type { FrozenCheck, ReviewDto } from '#shared/contract/review.ts';

/** Who opened the figures when, and what each decision froze of the check. */
export function ReviewRecord({ review: { openings, checks } }: { review: ReviewDto }) {
  const frozen = checks.flatMap((each) => (each.check === null ? [] : [{ ...each, check: each.check }]));
  if (openings.length + frozen.length === 0) return null;
  return (
    <section aria-labelledby="review-record" className="border-t border-rule px-3 py-2">
      <h2 id="review-record" className="m-0 text-base font-bold">
        {text.record}
      </h2>
      {openings.map(({ person, at, hash }) => (
        <p key={hash} className="m-0 text-ink-2">
          {text.opened(person.name, formatMoment(at))}
        </p>
      ))}
      {frozen.map(({ person, at, decision, check, hash }) => (
        <details key={hash} className="mt-1">
          <summary className="touch cursor-pointer">
            {text.checkedBy(person.name)}, {checkText.records[decision](person.name, formatMoment(at))}
            <Counts check={check} />
          </summary>
          <NotTicked check={check} />
          <Answers check={check} />
          <p className="m-0 mt-1 text-sm text-ink-2">
            {text.hash} <code className="font-mono text-xs break-all">{hash}</code>
          </p>
        </details>
      ))}
    </section>
  );
}

function Counts({ check: { figures, checkList } }: { check: FrozenCheck }) {
  const answered = checkList.filter(({ answer }) => answer !== null).length;
  return (
    <span className="block text-ink-2">
      {text.ticked(figures.filter(({ ticked }) => ticked).length, figures.length)}
      {checkList.length > 0 ? `; ${text.answered(answered, checkList.length)}` : ''}
    </span>
  );
}

function NotTicked({ check: { figures } }: { check: FrozenCheck }) {
  const rest = figures.filter(({ ticked }) => !ticked);
  if (rest.length === 0) return <p className="m-0">{text.allTicked}</p>;
  const parts = [...new Set(rest.map(({ of }) => of))];
  return (
    <>
      <h3 className="mt-1 mb-0 text-sm font-semibold">{text.notTicked}</h3>
      <ul className="m-0 list-none p-0">
        {parts.map((part) => (
          <li key={part} className="break-words">
            {sentenceText(part)}:{' '}
            {rest
              .filter(({ of }) => of === part)
              .map(({ what }) => what)
              .join(', ')}
          </li>
        ))}
      </ul>
    </>
  );
}

function Answers({ check: { checkList } }: { check: FrozenCheck }) {
  if (checkList.length === 0) return <p className="m-0 mt-1">{text.listEmpty}</p>;
  return (
    <dl className="m-0 mt-1 flex flex-col gap-1">
      {checkList.map(({ id, text: asked, answer, remark }) => (
        <div key={id}>
          <dt className="break-words text-ink-2">{asked}</dt>
          <dd className="m-0 break-words whitespace-pre-line">
            <b className="font-semibold">{answer === null ? text.answerNone : text.answers[answer]}</b>
            {remark ? `: ${remark}` : ''}
          </dd>
        </div>
      ))}
    </dl>
  );
}

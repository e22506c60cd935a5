import { checkText as text } from '#client/text/revisions.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';

/** What was open when the revision was sent, with the engineer's reasons, as frozen. */
export function StayedOpenList({ stayedOpen }: Pick<RevisionPayload, 'stayedOpen'>) {
  return (
    <section aria-labelledby="stayed-open" className="border-t border-rule px-3 py-2">
      <h2 id="stayed-open" className="m-0 text-base font-bold">
        {text.stayedOpenTitle}
      </h2>
      {stayedOpen === null ? <p className="m-0 text-ink-2">{text.stayedOpenUnasked}</p> : null}
      {stayedOpen?.length === 0 ? <p className="m-0 text-ink-2">{text.stayedOpenNone}</p> : null}
      <dl className="m-0 flex flex-col gap-1.5">
        {(stayedOpen ?? []).map((item) => (
          <div key={item.key}>
            <dt className="break-words">{item.text}</dt>
            <dd className="m-0 break-words whitespace-pre-line text-ink-2">
              {text.reason}: {item.reason}
            </dd>
          </div>
        ))}
      </dl>
    </section>
  );
}

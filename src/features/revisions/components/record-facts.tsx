import type { ReactNode } from 'react';
import { formatFullDay, formatMoment } from '#client/lib/dates.ts';
import { checkText as text } from '#client/text/revisions.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { namesText } from '#shared/text/names-text.ts';

/** What identifies the frozen record: who and when, what it was made from, and the chain it stands in. */
export function RecordFacts({ revision }: { revision: RevisionDto }) {
  const { summary, payload } = revision;
  const { drawing } = payload;
  return (
    <section aria-labelledby="record" className="border-t border-rule px-3 py-2">
      <h2 id="record" className="m-0 text-base font-bold">
        {text.recordTitle}
      </h2>
      <p className="m-0 text-ink-2">{text.frozen}</p>
      <dl className="m-0 mt-1 flex flex-col gap-1">
        <Fact name={text.sentBy(summary.sentBy.name, formatMoment(summary.sentAt))}>
          {text.to(namesText(summary.reviewers))}
        </Fact>
        {summary.dueOn ? <Fact name={text.dueOn}>{formatFullDay(`${summary.dueOn}T12:00:00`)}</Fact> : null}
        <Fact name={text.drawnBy}>{payload.drawnBy.map((person) => person.name).join(', ')}</Fact>
        {payload.message ? <Fact name={text.message}>{payload.message}</Fact> : null}
        <Fact name={text.hash}>
          <Hash value={summary.hash} />
        </Fact>
        <Fact name={text.previous}>
          {payload.previousHash ? <Hash value={payload.previousHash} /> : text.first}
        </Fact>
        <Fact name={text.drawing}>
          {[drawing.number, drawing.revision && `rev ${drawing.revision}`, drawing.title]
            .filter(Boolean)
            .join(' ')}
        </Fact>
        <Fact name={text.drawingHash}>
          <Hash value={drawing.sha256} />
        </Fact>
        <Fact name={text.engine}>{payload.engineVersion}</Fact>
      </dl>
    </section>
  );
}

function Fact({ name, children }: { name: string; children: ReactNode }) {
  return (
    <div>
      <dt className="text-sm text-ink-2">{name}</dt>
      <dd className="m-0 break-words whitespace-pre-line">{children}</dd>
    </div>
  );
}

const Hash = ({ value }: { value: string }) => <code className="font-mono text-xs break-all">{value}</code>;

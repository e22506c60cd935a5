import { sentenceText } from '#client/lib/figures.ts';
import { findingsText as text } from '#client/text/desk-forms.ts';
import type { Finding } from '#shared/contract/reading.ts';

const COLOURS = {
  wrong: 'text-wrong',
  missing: 'text-attention',
  question: 'text-attention',
  note: 'text-ink-2',
};

/** What was found about the net, in the order given, each with its place. */
export function FindingsList({
  findings,
  onShow,
}: {
  findings: readonly Finding[];
  onShow: (finding: Finding) => void;
}) {
  if (findings.length === 0) return <p className="m-0">{text.none}</p>;
  return (
    <ul className="m-0 list-none p-0">
      {findings.map((found) => (
        <li key={keyOf(found)} className="border-b border-rule-2 py-1.5 last:border-b-0">
          <b className={`font-semibold ${COLOURS[found.weight]}`}>{text.weights[found.weight]}.</b>{' '}
          {sentenceText(found.text)}
          {found.at || found.entityIds.length > 0 ? (
            <button type="button" className="touch ml-2 text-sm underline" onClick={() => onShow(found)}>
              {text.show}
            </button>
          ) : null}
        </li>
      ))}
    </ul>
  );
}

const keyOf = (found: Finding) => `${found.code} ${found.entityIds.join(' ')} ${found.text}`;

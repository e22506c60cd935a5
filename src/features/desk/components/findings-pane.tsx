import { findingsText as text } from '#client/text/desk-forms.ts';
import type { Finding, NetReading } from '#shared/contract/reading.ts';
import { FormPane } from './form-pane.tsx';
import { byWeight } from './title-block-cells.ts';

const COLOURS = {
  wrong: 'text-wrong',
  missing: 'text-attention',
  question: 'text-attention',
  note: 'text-ink-2',
};

/** Everything found about the net, gravest first, each with its place. */
export function FindingsPane({
  reading,
  onShow,
  onClose,
}: {
  reading: NetReading | null;
  /** Null where nothing can be shown on the sheet. */
  onShow: ((finding: Finding) => void) | null;
  onClose: () => void;
}) {
  const findings = byWeight(reading?.findings ?? []);
  return (
    <FormPane title={text.title} onClose={onClose}>
      {reading ? null : <p className="m-0 text-ink-2">{text.working}</p>}
      {reading && findings.length === 0 ? <p className="m-0">{text.none}</p> : null}
      <ul className="m-0 list-none p-0">
        {findings.map((found) => (
          <li key={keyOf(found)} className="border-b border-rule-2 py-1.5 last:border-b-0">
            <b className={`font-semibold ${COLOURS[found.weight]}`}>{text.weights[found.weight]}.</b>{' '}
            {found.text}
            {onShow && (found.at || found.entityIds.length > 0) ? (
              <button type="button" className="touch ml-2 text-sm underline" onClick={() => onShow(found)}>
                {text.show}
              </button>
            ) : null}
          </li>
        ))}
      </ul>
    </FormPane>
  );
}

const keyOf = (found: Finding) => `${found.code} ${found.entityIds.join(' ')} ${found.text}`;

import { explanationText as text } from '#client/text/explanation.ts';
import type { DoubtShares, DoubtSource } from '#shared/contract/reading-doubt.ts';
import type { MarginForm } from './margin-form.tsx';

/** The form in which each source can be bettered; `pointId` is the point that the figure belongs to, if any. */
export function formOfSource(source: DoubtSource, pointId: string | null): MarginForm | null {
  switch (source) {
    case 'knownPoints':
    case 'tracing':
    case 'place':
      return { form: 'count' };
    case 'waterLevels':
    case 'datum':
    case 'gammaW':
      return { form: 'water' };
    case 'permeability':
      return { form: 'permeability' };
    case 'tip':
      return pointId === null ? null : { form: 'measured', pointId };
  }
}

/** What a ± is made of: a bar and a figure for each source, and where it can be changed. */
export function DoubtSharesList({
  shares,
  what,
  pointId,
  onOpen,
}: {
  shares: DoubtShares;
  /** What the ± is of, as it stands within a sentence. */
  what: string;
  pointId: string | null;
  /** Null where nothing may be changed. */
  onOpen: ((form: MarginForm) => void) | null;
}) {
  if (shares.length === 0) return <p className="m-0 text-sm text-ink-2">{text.none}</p>;
  return (
    <ul aria-label={text.shares(what)} className="m-0 flex list-none flex-col gap-1 p-0 text-sm">
      {shares.map(({ source, part }) => (
        <Share key={source} source={source} part={part} pointId={pointId} onOpen={onOpen} />
      ))}
    </ul>
  );
}

function Share({
  source,
  part,
  pointId,
  onOpen,
}: {
  source: DoubtSource;
  part: number;
  pointId: string | null;
  onOpen: ((form: MarginForm) => void) | null;
}) {
  const name = text.sources[source];
  const form = formOfSource(source, pointId);
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_72px_40px_auto] items-center gap-2">
      <span>{name}</span>
      <span aria-hidden="true" className="h-[9px] border border-edge bg-film">
        <span className="block h-full bg-ink-2" style={{ width: `${100 * part}%` }} />
      </span>
      <span className="text-right">{text.share(part)}</span>
      {onOpen && form ? (
        <button
          type="button"
          aria-label={text.changeNamed(name)}
          className="touch pointer-fine:min-h-6 underline"
          onClick={() => onOpen(form)}
        >
          {text.change}
        </button>
      ) : (
        <span />
      )}
    </li>
  );
}

import { ProblemNote } from '#client/components/problem-note.tsx';
import { sentenceText } from '#client/lib/figures.ts';
import { checkWorkText as text } from '#client/text/check-work.ts';
import { richRuns } from '#shared/text/calculation-sheet/rich-text.ts';
import { useCheckWork } from './check-work.tsx';
import { TickBox } from './tick-box.tsx';

/** How many figures are ticked, and those that stand neither in the schedule nor in the title block. */
export function FiguresChecked() {
  const work = useCheckWork();
  if (work === null) return null;
  const { figures, ticked, error } = work;
  const further = figures.filter(({ part }) => part === 'further');
  const count = figures.filter(({ key }) => ticked.has(key)).length;
  return (
    <section aria-labelledby="figures-checked" className="px-3 py-2">
      <div className="flex flex-wrap items-baseline gap-x-2">
        <h2 id="figures-checked" className="m-0 text-base font-bold">
          {text.figures}
        </h2>
        <output className="ml-auto tabular-nums">{text.ticked(count, figures.length)}</output>
      </div>
      <p className="m-0 text-sm text-ink-2">{text.tickLead}</p>
      {further.length > 0 ? (
        <>
          <h3 className="mt-2 mb-0.5 text-sm font-semibold">{text.further}</h3>
          <ul className="m-0 list-none p-0">
            {further.map(({ key, of, what, value }) => (
              <li key={key} className="flex items-center gap-1 border-b border-rule-2 py-1">
                <TickBox figureKey={key} />
                <span className="min-w-0 flex-1 break-words">
                  {sentenceText(of)}, {what}
                </span>
                <span className="text-right tabular-nums">
                  <Value text={sentenceText(value)} />
                </span>
              </li>
            ))}
          </ul>
        </>
      ) : null}
      <ProblemNote error={error} />
    </section>
  );
}

function Value({ text: value }: { text: string }) {
  return richRuns(value).map((run, i) => {
    // Runs have no identity of their own but their place in the text.
    const key = `${i} ${run.text}`;
    return run.level === 'raised' ? <sup key={key}>{run.text}</sup> : <span key={key}>{run.text}</span>;
  });
}

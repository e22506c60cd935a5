import { useId } from 'react';
import { fixedText, plainText, sentenceText, signedText } from '#client/lib/figures.ts';
import { changesWords as text } from '#client/text/revision-changes.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import type { RevisionComparison } from '#shared/contract/revision-comparison.ts';
import { changedFactText, changesText } from '#shared/text/changes-text.ts';
import { DECIMALS, unitNames } from '#shared/text/unit-text.ts';

interface RevisionChangesProps {
  comparison: RevisionComparison;
  /** Label of the revision before. */
  label: string;
  unitSystem: UnitSystem;
  drawnOver: boolean;
  onDrawnOver: (drawnOver: boolean) => void;
}

/** What changed since the revision before: in a few sentences, line by line, and pressures side by side. */
export function RevisionChanges(props: RevisionChangesProps) {
  const { comparison, label, unitSystem, drawnOver, onDrawnOver } = props;
  return (
    <section aria-labelledby="changes" className="border-t border-rule px-3 py-2">
      <h2 id="changes" className="m-0 text-base font-bold">
        {text.title(label)}
      </h2>
      <ul className="m-0 list-none p-0">
        {changesText(comparison, unitSystem).map((sentence) => (
          <li key={sentence} className="break-words">
            {sentenceText(sentence)}
          </li>
        ))}
      </ul>
      {comparison.lines.length > 0 ? (
        <label className="touch flex items-center gap-2 py-1">
          <input
            type="checkbox"
            className="size-4 shrink-0 accent-ink"
            checked={drawnOver}
            onChange={(event) => onDrawnOver(event.target.checked)}
          />
          {text.drawOver(label)}
        </label>
      ) : null}
      <ChangedThings comparison={comparison} unitSystem={unitSystem} />
      <PressureTable {...props} />
    </section>
  );
}

type ChangedThingsProps = Pick<RevisionChangesProps, 'comparison' | 'unitSystem'>;

/** Lines that changed, each with how far, and what else is otherwise of lines and points. */
export function ChangedThings({ comparison, unitSystem }: ChangedThingsProps) {
  const changed = [...comparison.lines, ...comparison.points].filter((each) => each.facts.length > 0);
  return (
    <>
      <LineChanges comparison={comparison} unitSystem={unitSystem} />
      {changed.map((each) => (
        <p key={each.id} className="m-0 break-words text-ink-2">
          {each.name || text.unnamed}: {each.facts.map(changedFactText).map(sentenceText).join(' ')}
        </p>
      ))}
    </>
  );
}

function LineChanges({ comparison, unitSystem }: ChangedThingsProps) {
  const { length } = unitNames(unitSystem);
  return (
    <ul className="m-0 list-disc pl-5">
      {comparison.lines.map(({ id, line, name, drops, change, movedPx, moved }) => (
        <li key={id}>
          {text.lines[line]} {name || (drops === null ? '' : text.atDrops(plainText(drops)))}{' '}
          {change !== 'changed' || movedPx === null
            ? text.change[change]
            : moved === null
              ? text.movedPx(fixedText(movedPx, 1))
              : text.moved(fixedText(moved, 2), length)}
        </li>
      ))}
    </ul>
  );
}

function PressureTable({ comparison, label, unitSystem }: RevisionChangesProps) {
  const caption = useId();
  const decimals = DECIMALS[unitSystem].pressure;
  if (comparison.figures.length === 0) return null;
  const cell = 'border-b border-rule-2 py-0.5 pl-2 text-right tabular-nums';
  return (
    <>
      <p id={caption} className="m-0 mt-2 text-sm font-semibold">
        {text.pressures(unitNames(unitSystem).pressure)}
      </p>
      <table aria-labelledby={caption} className="w-full border-collapse text-sm">
        <thead>
          <tr>
            <th className="border-b border-rule text-left font-semibold">{text.point}</th>
            <th className={`${cell} font-semibold`}>{label}</th>
            <th className={`${cell} font-semibold`}>{text.now}</th>
            <th className={`${cell} font-semibold`}>{text.difference}</th>
          </tr>
        </thead>
        <tbody>
          {comparison.figures.map(({ id, name, porePressure }) => (
            <tr key={id}>
              <th className="border-b border-rule-2 text-left font-normal">{name || text.unnamed}</th>
              <td className={cell}>{fixedText(porePressure.before, decimals)}</td>
              <td className={cell}>{fixedText(porePressure.after, decimals)}</td>
              <td className={cell}>{signedText(porePressure.difference, decimals)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </>
  );
}

import { fixedText, plusMinusText } from '#client/lib/figures.ts';
import { exitsText } from '#client/text/exits.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { ExitReading } from '#shared/contract/reading-quantities.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import { PlainTable } from './plain-table.tsx';

const text = exitsText.exits;

/** The cells at which water leaves, each with both its gradients; a factor only where it may be given. */
export function ExitTable({
  document,
  exits,
  onShow,
}: {
  document: FlowNetDocument;
  exits: readonly ExitReading[];
  onShow: (at: SheetPoint) => void;
}) {
  const { length, unitWeight } = unitNames(document.unitSystem);
  const decimals = DECIMALS[document.unitSystem];
  const columns = [
    { head: text.exit },
    { head: text.offset(length) },
    { head: text.elevation(elevationUnit(document.unitSystem, document.datum)) },
    { head: text.lost(length) },
    { head: text.length(length) },
    { head: text.average },
    { head: text.point },
    { head: text.critical },
    { head: text.factor },
    { head: text.pointFactor },
    { head: text.force(unitWeight) },
  ];
  const rows = exits.map((exit, i) => ({
    key: `${exit.outlet} ${exit.before} ${exit.left}`,
    cells: [
      <button
        key="show"
        type="button"
        className="touch underline"
        aria-label={exitsText.showExit(i + 1)}
        onClick={() => onShow(exit.at)}
      >
        {i + 1}
      </button>,
      fixedText(exit.offset, decimals.offset),
      fixedText(exit.elevation, decimals.elevation),
      fixedText(exit.headLost, decimals.head),
      fixedText(exit.length, 2),
      plusMinusText(exit.cellGradient, exit.cellGradientPlusMinus, 3),
      exit.pointState === 'singular' ? text.singular : fixedText(exit.pointGradient, 3),
      fixedText(exit.criticalGradient, 2),
      fixedText(exit.factor, 1),
      fixedText(exit.pointFactor, 1),
      fixedText(exit.seepageForce, 1),
    ],
  }));
  return (
    <>
      <PlainTable caption={text.title} columns={columns} rows={rows} />
      <ul className="m-0 list-none p-0 text-sm text-ink-2">
        {remarksOn(exits).map((remark) => (
          <li key={remark}>{remark}</li>
        ))}
      </ul>
    </>
  );
}

/** Why there is no factor, once for all the exits for which the reason is the same. */
function remarksOn(exits: readonly ExitReading[]): string[] {
  const numbers = new Map<string, number[]>();
  exits.forEach(({ factorNote }, i) => {
    if (factorNote !== '') numbers.set(factorNote, [...(numbers.get(factorNote) ?? []), i + 1]);
  });
  return [...numbers].map(([remark, which]) =>
    which.length === exits.length ? remark : exitsText.remarkOn(which.join(', '), remark),
  );
}

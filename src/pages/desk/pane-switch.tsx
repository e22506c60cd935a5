import { classNames } from '#client/components/class-names.ts';
import { deskPageText } from '#client/text/desk-page.ts';

/** The buttons at the foot of a narrow screen that bring one part of the desk to the front. */
export function PaneSwitch<P extends string>({
  panes,
  names,
  pane,
  onPane,
}: {
  panes: readonly P[];
  names: Readonly<Record<P, string>>;
  pane: P;
  onPane: (pane: P) => void;
}) {
  return (
    <nav
      aria-label={deskPageText.panesLabel}
      className="grid shrink-0 auto-cols-fr grid-flow-col border-t border-ink bg-film"
    >
      {panes.map((each) => (
        <button
          key={each}
          type="button"
          aria-pressed={each === pane}
          className={classNames(
            'min-h-[44px] border-t-[3px] px-1 text-sm',
            each === pane ? 'border-equipotential bg-chosen font-semibold' : 'border-transparent',
          )}
          onClick={() => onPane(each)}
        >
          {names[each]}
        </button>
      ))}
    </nav>
  );
}

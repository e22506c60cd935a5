import { useStore } from 'zustand';
import { classNames } from '#client/components/class-names.ts';
import { drawingWayText as text } from '#client/text/drawing-ways.ts';
import { chooseDrawingWay, DRAWING_WAYS, type DrawingWay, drawingWayChoice } from '../model/drawing-way.ts';

/** How lines are drawn, under the tool in hand that draws them. */
export function DrawingWays({ column }: { column: boolean }) {
  const chosen = useStore(drawingWayChoice, ({ way }) => way);
  return (
    <fieldset
      className={classNames(
        'm-0 border-0 p-0',
        column
          ? 'mt-0.5 mb-1.5 grid grid-cols-[auto_auto] justify-start gap-x-2.5 pl-[46px]'
          : 'flex items-center',
      )}
    >
      <legend className="sr-only">{text.title}</legend>
      {DRAWING_WAYS.map((way) => (
        <Way key={way} way={way} chosen={way === chosen} column={column} />
      ))}
    </fieldset>
  );
}

function Way({ way, chosen, column }: { way: DrawingWay; chosen: boolean; column: boolean }) {
  return (
    <button
      type="button"
      aria-pressed={chosen}
      title={text.hints[way]}
      onClick={() => chooseDrawingWay(way)}
      className={classNames(
        'whitespace-nowrap border-0 bg-transparent py-1 text-left text-sm hover:bg-hover touch',
        !column && 'px-2.5',
        chosen && 'font-semibold underline decoration-2 underline-offset-4 decoration-equipotential',
      )}
    >
      {text.names[way]}
    </button>
  );
}

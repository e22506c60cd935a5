import { classNames } from '#client/components/class-names.ts';
import { fixedText } from '#client/lib/figures.ts';
import { editingText } from '#client/text/editing-lines.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import { TableNumber } from './table-inputs.tsx';
import { figuresOf, type VertexUnits } from './vertex-rows.ts';

const text = editingText.vertices;
const DECIMALS: Readonly<Record<VertexUnits, number>> = { section: 3, sheet: 2 };

interface VertexRowProps {
  index: number;
  at: SheetPoint;
  units: VertexUnits;
  map: SectionMap | null;
  heads: readonly [string, string];
  chosen: boolean;
  disabled: boolean;
  /** Chooses the point; `onShow` brings it into view besides. */
  onChoose: (index: number) => void;
  onShow: (index: number) => void;
  onType: (index: number, axis: 0 | 1, figure: number) => void;
}

/** One point of a line: its number, which chooses it, and its two figures. */
export function VertexRow(props: VertexRowProps) {
  const { index, at, units, map, heads, chosen, disabled, onChoose, onShow, onType } = props;
  const figures = figuresOf(at, units, map);
  return (
    <tr aria-current={chosen || undefined} className={chosen ? 'bg-chosen' : undefined}>
      <td className="border-b border-rule-2 px-1.5 py-[2px]">
        <button
          type="button"
          aria-pressed={chosen}
          aria-label={text.choose(index + 1)}
          className={classNames('touch w-full border-0 bg-transparent text-left', chosen && 'font-semibold')}
          onClick={() => onShow(index)}
        >
          {index + 1}
        </button>
      </td>
      {([0, 1] as const).map((axis) => (
        <td
          key={axis}
          className="border-b border-rule-2 px-1.5 py-[2px]"
          onFocus={chosen ? undefined : () => onChoose(index)}
        >
          <TableNumber
            label={text.field(heads[axis], index + 1)}
            value={figures[axis]}
            shown={fixedText(figures[axis], DECIMALS[units])}
            disabled={disabled}
            onCommit={(figure) => figure !== null && onType(index, axis, figure)}
          />
        </td>
      ))}
    </tr>
  );
}

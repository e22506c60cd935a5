import { Fragment } from 'react';
import { useStore } from 'zustand';
import { classNames } from '#client/components/class-names.ts';
import { type PaletteTool, deskPaletteText as text } from '#client/text/desk-palette.ts';
import { keysText } from '#client/text/keys.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { BOUNDARY_KINDS, type BoundaryKind } from '../model/tool-choice.ts';
import type { HistoryKeeping } from '../saving/keep-history.ts';
import { TOOL_KEYS, WATER_KEY } from './desk-keys.ts';
import { DrawingWays } from './drawing-ways.tsx';
import { FirstGuess } from './first-guess.tsx';
import { HistorySteps } from './history-steps.tsx';
import { ToolHint } from './tool-hint.tsx';
import { ToolIcon } from './tool-icons.tsx';

const GROUPS: ReadonlyArray<{ title: string; tools: readonly PaletteTool[] }> = [
  { title: text.setOut, tools: ['knownPoint', 'waterLevels', 'ruler'] },
  { title: text.trace, tools: ['equipotential', 'flowLine', 'phreaticLine', 'boundary'] },
  { title: text.read, tools: ['readingPoint', 'profile', 'note'] },
];

type ToolPaletteProps = {
  store: DeskStore;
  /** `column` beside the sheet, `row` above or below it on a narrow screen. */
  layout?: 'column' | 'row';
  /** What keeps the steps over a reload; null where nothing may be changed. */
  keeping?: HistoryKeeping | null;
  className?: string;
};

/** The tools with their keys, and at the foot what the tool in hand does now. Pressing the tool in hand lays it down. */
export function ToolPalette({ store, layout = 'column', keeping = null, className }: ToolPaletteProps) {
  const column = layout === 'column';
  return (
    <nav
      aria-label={text.title}
      className={classNames(
        // Hidden headings are placed by it, so that they do not widen the page of a phone.
        'relative flex bg-film',
        column ? 'flex-col overflow-y-auto py-3.5' : 'items-stretch overflow-x-auto',
        className,
      )}
    >
      {GROUPS.map((group) => (
        <div key={group.title} className={column ? 'mb-3.5' : 'flex items-stretch border-r border-rule'}>
          <h2 className={column ? 'mx-4 mt-0 mb-1 text-sm font-semibold text-ink-2' : 'sr-only'}>
            {group.title}
          </h2>
          {group.tools.map((tool) => (
            <Fragment key={tool}>
              <PaletteButton store={store} tool={tool} column={column} />
              {group.title === text.trace && <WaysUnder store={store} tool={tool} column={column} />}
            </Fragment>
          ))}
          {group.tools.includes('boundary') && <BoundaryKinds store={store} column={column} />}
        </div>
      ))}
      <HistoryButtons store={store} column={column} keeping={keeping} />
      {column && <ToolHint store={store} />}
      {column && <FirstGuess store={store} />}
      <button
        type="button"
        aria-haspopup="dialog"
        aria-keyshortcuts="?"
        className={classNames(
          'flex items-center border-0 bg-transparent text-left hover:bg-hover touch',
          column ? 'w-full shrink-0 border-t border-rule-2 px-4 py-1.5' : 'px-3 whitespace-nowrap',
        )}
        onClick={() => store.emitIntent({ type: 'listKeys' })}
      >
        {keysText.open}
        {column && (
          <span aria-hidden="true" className="ml-auto text-xs text-ink-2">
            ?
          </span>
        )}
      </button>
    </nav>
  );
}

const ROW_BUTTON = 'whitespace-nowrap px-3 border-b-[3px]';
const COLUMN_BUTTON = 'w-full px-4 py-1.5 border-l-[3px]';

function PaletteButton({ store, tool, column }: { store: DeskStore; tool: PaletteTool; column: boolean }) {
  const inHand = useStore(store, (state) => state.tool === tool);
  const readOnly = useStore(store, (state) => state.readOnly);
  const letter = keyOf(tool);
  function choose(): void {
    if (tool === 'waterLevels') store.emitIntent({ type: 'openWaterLevels' });
    else store.setTool(inHand ? 'select' : tool);
  }
  return (
    <button
      type="button"
      disabled={readOnly && tool !== 'note' && tool !== 'waterLevels' && tool !== 'ruler'}
      aria-pressed={tool === 'waterLevels' ? undefined : inHand}
      aria-keyshortcuts={letter}
      onClick={choose}
      className={classNames(
        'flex items-center gap-2.5 border-0 bg-transparent text-left disabled:opacity-55 touch',
        column ? COLUMN_BUTTON : ROW_BUTTON,
        inHand ? 'border-equipotential bg-chosen font-semibold' : 'border-transparent hover:bg-hover',
      )}
    >
      <ToolIcon tool={tool} />
      {text.tools[tool]}
      {column && (
        // The key is told by aria-keyshortcuts; as part of the name it would be read as a word.
        <span aria-hidden="true" className="ml-auto text-xs font-normal text-ink-2">
          {letter}
        </span>
      )}
    </button>
  );
}

/** The ways of drawing stand under the tool in hand that draws lines. */
function WaysUnder({ store, tool, column }: { store: DeskStore; tool: PaletteTool; column: boolean }) {
  const shown = useStore(store, (state) => state.tool === tool && !state.readOnly);
  return shown ? <DrawingWays column={column} /> : null;
}

function keyOf(tool: PaletteTool): string {
  if (tool === 'waterLevels') return WATER_KEY.toUpperCase();
  const found = Object.entries(TOOL_KEYS).find(([, id]) => id === tool);
  return (found?.[0] ?? '').toUpperCase();
}

/** Which kind of boundary is drawn, while that tool is in hand. */
function BoundaryKinds({ store, column }: { store: DeskStore; column: boolean }) {
  const shown = useStore(store, (state) => state.tool === 'boundary');
  const kind = useStore(store, (state) => state.boundaryKind);
  if (!shown) return null;
  return (
    <fieldset className={classNames('m-0 border-0 p-0', column ? 'mt-0.5 mb-1' : 'flex items-center')}>
      <legend className="sr-only">{text.boundaryKinds}</legend>
      {BOUNDARY_KINDS.map((choice) => (
        <BoundaryChoice
          key={choice}
          choice={choice}
          chosen={choice === kind}
          column={column}
          onChoose={() => store.setTool('boundary', choice)}
        />
      ))}
    </fieldset>
  );
}

type BoundaryChoiceProps = { choice: BoundaryKind; chosen: boolean; column: boolean; onChoose(): void };

function BoundaryChoice({ choice, chosen, column, onChoose }: BoundaryChoiceProps) {
  return (
    <button
      type="button"
      aria-pressed={chosen}
      onClick={onChoose}
      className={classNames(
        'border-0 bg-transparent text-left text-sm hover:bg-hover touch',
        column ? 'block w-full py-1 pr-2 pl-[46px]' : 'whitespace-nowrap px-2.5',
        chosen && 'font-semibold underline decoration-2 underline-offset-4 decoration-equipotential',
      )}
    >
      {text.boundaries[choice]}
    </button>
  );
}

function HistoryButtons({
  store,
  column,
  keeping,
}: {
  store: DeskStore;
  column: boolean;
  keeping: HistoryKeeping | null;
}) {
  const { undoLabel, redoLabel } = useStore(store, (state) => state.history);
  const readOnly = useStore(store, (state) => state.readOnly);
  if (readOnly) return null;
  const look = 'border-0 bg-transparent py-1.5 pr-1 pl-4 text-left hover:bg-hover disabled:opacity-55 touch';
  return (
    <div className={column ? 'mt-auto flex border-t border-rule-2 pt-2' : 'flex'}>
      <button
        type="button"
        className={look}
        disabled={undoLabel === null}
        title={text.undoTitle(undoLabel)}
        aria-keyshortcuts="Control+Z"
        onClick={() => store.undo()}
      >
        {text.undo}
      </button>
      <HistorySteps store={store} from="done" keeping={keeping} />
      <button
        type="button"
        className={look}
        disabled={redoLabel === null}
        title={text.redoTitle(redoLabel)}
        aria-keyshortcuts="Control+Shift+Z"
        onClick={() => store.redo()}
      >
        {text.redo}
      </button>
      <HistorySteps store={store} from="undone" keeping={keeping} />
    </div>
  );
}

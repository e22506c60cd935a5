import type { ReactNode } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { sentenceText } from '#client/lib/figures.ts';
import { notesText } from '#client/text/notes.ts';
import { titleBlockText as text } from '#client/text/title-block.ts';
import { Runs } from './runs.tsx';
import type { CellId, TitleCell } from './title-block-cells.ts';

/** Columns of eight each cell takes, as on the sheet. */
const SPANS: Record<CellId, string> = {
  section: 'col-span-4',
  dam: 'col-span-4',
  scale: 'col-span-4',
  residual: 'col-span-4',
  headwater: 'col-span-4',
  outlet: 'col-span-4',
  drops: 'col-span-2',
  channels: 'col-span-2',
  headPerDrop: 'col-span-4',
  permeability: 'col-span-4',
  seepage: 'col-span-4',
  netCheck: 'col-span-8',
  drawn: 'col-span-3',
  checked: 'col-span-3',
  calculation: 'col-span-2',
};

interface TitleBlockProps {
  cells: readonly TitleCell[];
  /** True while the figures shown are older than the traces. */
  stale: boolean;
  /** Cell whose step is open beside the sheet. */
  open: CellId | null;
  /** Null on a frozen sheet, where no cell does a step. */
  onStep: ((id: CellId) => void) | null;
  /** Notes on single cells; left out where none are shown. */
  notes?: CellNotesOf;
  /** What stands in the corner of a cell, such as a tick; left out where nothing does. */
  markOf?: (id: CellId) => ReactNode;
}

interface CellNotesOf {
  openOn: (id: CellId) => ReadonlyArray<{ id: string; number: number }>;
  /** Begins a note on a cell; null for who may not write. */
  onNote: ((id: CellId) => void) | null;
  onOpen: (noteId: string) => void;
}

/**
 * The title block at the foot of the margin: each cell shows one fact and its state, and pressing it does that step.
 * Cells are ruled by a one-pixel gap over ink, so that they close up whatever their height.
 */
export function TitleBlock({ cells, stale, open, onStep, notes, markOf }: TitleBlockProps) {
  return (
    <section
      aria-label={text.name}
      aria-busy={stale}
      className="grid shrink-0 grid-cols-8 gap-px border-t-[1.5px] border-ink bg-ink"
    >
      {cells.map((cell) => (
        <div key={cell.id} className={classNames('group relative grid min-w-0', SPANS[cell.id])}>
          <Cell cell={cell} open={open === cell.id} onStep={onStep} />
          {notes ? <CellNotes cell={cell} notes={notes} /> : null}
          {markOf ? <span className="absolute top-1 right-0">{markOf(cell.id)}</span> : null}
        </div>
      ))}
    </section>
  );
}

const CELL =
  'flex flex-col items-start justify-start min-h-[43px] min-w-0 px-2 pt-1 pb-[5px] text-left leading-[1.3] [overflow-wrap:anywhere]';

function Cell({ cell, open, onStep }: { cell: TitleCell; open: boolean; onStep: TitleBlockProps['onStep'] }) {
  const doubtful = cell.state !== 'ok';
  const look = classNames(
    CELL,
    doubtful ? 'bg-doubt' : 'bg-film',
    open && 'outline-2 -outline-offset-2 outline-focus',
  );
  if (!onStep) {
    return (
      <div className={look}>
        <Content cell={cell} />
      </div>
    );
  }
  return (
    <button
      type="button"
      className={classNames(look, 'touch', !doubtful && 'hover:bg-hover')}
      title={titleOf(cell)}
      onClick={() => onStep(cell.id)}
    >
      <Content cell={cell} />
    </button>
  );
}

/** The sign is small, what is pressed is 24 px high and wide. */
const SIGN =
  'group/sign pointer-events-auto flex min-h-6 min-w-6 items-start justify-end border-0 bg-transparent p-0';

function Sign({ children }: { children: ReactNode }) {
  return (
    <span className="rounded-full border border-ink bg-film px-1.5 text-[11px] leading-[16px] group-hover/sign:bg-hover">
      {children}
    </span>
  );
}

/** In a cell's corner the balloons of its open notes, and the way to begin one while the cell is pointed at. */
function CellNotes({ cell, notes }: { cell: TitleCell; notes: CellNotesOf }) {
  const { onNote } = notes;
  return (
    <div className="pointer-events-none absolute top-0.5 right-0.5 flex gap-0.5">
      {notes.openOn(cell.id).map((note) => (
        <button
          key={note.id}
          type="button"
          className={classNames(SIGN, 'font-semibold')}
          aria-label={notesText.noteOn(note.number, notesText.cells[cell.id])}
          title={notesText.noteOn(note.number, notesText.cells[cell.id])}
          onClick={() => notes.onOpen(note.id)}
        >
          <Sign>{note.number}</Sign>
        </button>
      ))}
      {onNote ? (
        <button
          type="button"
          className={classNames(
            SIGN,
            'opacity-0 group-hover:opacity-100 focus-visible:opacity-100 pointer-coarse:hidden',
          )}
          aria-label={notesText.onCell(notesText.cells[cell.id])}
          title={notesText.onCell(notesText.cells[cell.id])}
          onClick={() => onNote(cell.id)}
        >
          <Sign>{notesText.noteSign}</Sign>
        </button>
      ) : null}
    </div>
  );
}

function titleOf(cell: TitleCell): string {
  return [...cell.findings.map((found) => sentenceText(found.text)), text.step[cell.id]].join('\n');
}

const FACT_COLOURS = { ok: '', question: 'text-attention', missing: 'text-attention', wrong: 'text-wrong' };
/** Names of people and dates are lighter than figures, as on a drawing. */
const LIGHT: readonly CellId[] = ['drawn', 'checked'];

function Content({ cell }: { cell: TitleCell }) {
  const weight = LIGHT.includes(cell.id) ? '' : 'font-semibold';
  return (
    <>
      <span className="block text-[0.72rem] leading-[1.25] text-ink-2 [overflow-wrap:normal]">
        {cell.label}
        {cell.state === 'ok' || cell.said ? null : (
          <span className={FACT_COLOURS[cell.state]}> · {text.state[cell.state]}</span>
        )}
      </span>
      <span className={classNames('block', weight, FACT_COLOURS[cell.state])}>
        <Runs runs={cell.value} />
      </span>
    </>
  );
}

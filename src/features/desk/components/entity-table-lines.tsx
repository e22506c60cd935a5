import { Fragment, useId, useState } from 'react';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { fixedText, plainText, sentenceText } from '#client/lib/figures.ts';
import { lineText } from '#client/text/desk-forms.ts';
import { entityTableText as text } from '#client/text/entity-table.ts';
import type { FlowNetDocument, TracedLine } from '#shared/contract/document.ts';
import { elevationUnit } from '#shared/text/unit-text.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { LineRow } from '../model/entity-rows.ts';
import { RowActions } from './entity-table-parts.tsx';
import { TableNumber, TableText } from './table-inputs.tsx';
import { VertexTable } from './vertex-table.tsx';

interface LineTableProps {
  rows: readonly LineRow[];
  document: FlowNetDocument;
  store: DeskStore;
  disabled: boolean;
  onShow: (kind: 'line', id: string) => void;
}

/** Each line with its count, its head, how it stands and what was found about it. */
export function LineTable({ rows, document, ...shared }: LineTableProps) {
  const head = text.head(elevationUnit(document.unitSystem, document.datum));
  return (
    <Table caption={text.lines(rows.length)} stacked>
      <thead>
        <tr>
          <HeadCell>{text.kind}</HeadCell>
          <HeadCell>{text.name}</HeadCell>
          <HeadCell numeric>{text.drops}</HeadCell>
          <HeadCell numeric>{head}</HeadCell>
          <HeadCell numeric>{text.points}</HeadCell>
          <HeadCell>{text.state}</HeadCell>
          <HeadCell>{text.findings}</HeadCell>
          <HeadCell>{text.actions}</HeadCell>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <Row key={row.id} row={row} head={head} {...shared} />
        ))}
      </tbody>
    </Table>
  );
}

type RowProps = Omit<LineTableProps, 'rows' | 'document'> & { row: LineRow; head: string };

function Row({ row, head, store, disabled, onShow }: RowProps) {
  const [open, setOpen] = useState(false);
  const verticesId = useId();
  const { id, line } = row;
  const kind = lineText.kinds[line.line];
  const whose = line.name === '' ? text.numbered(kind, row.number) : `${kind} ${line.name}`;
  const still = disabled || row.locked;
  const change = (label: string, changes: Partial<TracedLine>) =>
    store.run(label, [{ op: 'put', entityId: id, value: { ...line, ...changes } }]);
  const field = { row, whose, disabled: still };
  return (
    <Fragment>
      <tr>
        <th scope="row" className="border-b border-rule-2 px-3.5 py-[5px] text-left font-normal">
          {line.name === '' ? whose : kind}
        </th>
        <Cell>
          {still ? (
            line.name
          ) : (
            <TableText
              label={text.fieldOf(text.name, whose)}
              value={line.name}
              maxLength={120}
              onCommit={(name) => change(text.labels.renamedLine({ ...line, name }), { name })}
            />
          )}
        </Cell>
        <DropsCell
          {...field}
          onCommit={(drops) =>
            change(text.labels.typedDrops(line), drops === null ? { drops } : { drops, head: null })
          }
        />
        <HeadOfLine
          {...field}
          label={text.fieldOf(head, whose)}
          onCommit={(value) =>
            change(
              text.labels.typedHead(line),
              value === null ? { head: value } : { head: value, drops: null },
            )
          }
        />
        <Cell numeric>
          <button
            type="button"
            aria-expanded={open}
            aria-controls={open ? verticesId : undefined}
            aria-label={text.pointsOf(line.points.length, whose)}
            className="touch underline"
            onClick={() => setOpen(!open)}
          >
            {line.points.length}
          </button>
        </Cell>
        <Cell>{row.states.map((state) => text.states[state]).join(', ')}</Cell>
        <Cell>{row.findings.map(({ text: said }) => sentenceText(said)).join(' ') || text.nothingFound}</Cell>
        <RowActions
          whose={whose}
          onShow={() => onShow('line', id)}
          onRemove={
            still ? null : () => store.run(lineText.labels.removed(kind), [{ op: 'remove', entityId: id }])
          }
        />
      </tr>
      {open ? (
        <tr id={verticesId}>
          <td colSpan={8} className="border-b border-rule bg-paper/40 px-3.5 pb-3">
            <div className="max-w-[28.75rem]">
              <VertexTable store={store} lineId={id} line={line} disabled={still} />
            </div>
          </td>
        </tr>
      ) : null}
    </Fragment>
  );
}

interface FieldProps {
  row: LineRow;
  whose: string;
  disabled: boolean;
  onCommit: (value: number | null) => void;
}

function DropsCell({ row: { line, drops }, whose, disabled, onCommit }: FieldProps) {
  if (line.line !== 'equipotential') return <Cell numeric>–</Cell>;
  if (disabled) return <Cell numeric>{drops === null ? '–' : plainText(drops)}</Cell>;
  return (
    <Cell numeric>
      <TableNumber
        label={text.fieldOf(text.drops, whose)}
        value={line.drops}
        shown={line.drops === null ? '' : plainText(line.drops)}
        optional
        onCommit={onCommit}
      />
      {line.drops === null && drops !== null ? <Counted>{plainText(drops)}</Counted> : null}
    </Cell>
  );
}

function HeadOfLine({ row: { line, head }, label, disabled, onCommit }: FieldProps & { label: string }) {
  const typed = line.line === 'equipotential' || line.line === 'drain';
  if (!typed || disabled) return <Cell numeric>{head === null ? '–' : fixedText(head, 2)}</Cell>;
  return (
    <Cell numeric>
      <TableNumber
        label={label}
        value={line.head}
        shown={line.head === null ? '' : fixedText(line.head, 2)}
        optional
        onCommit={onCommit}
      />
      {line.head === null && head !== null ? <Counted>{fixedText(head, 2)}</Counted> : null}
    </Cell>
  );
}

/** What stands by the count where nothing is typed. */
function Counted({ children }: { children: string }) {
  return <span className="block text-sm text-ink-2">{text.counted(children)}</span>;
}

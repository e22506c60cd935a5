import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { fixedText, sentenceText } from '#client/lib/figures.ts';
import { entityTableText as text } from '#client/text/entity-table.ts';
import type { EntityOf, FlowNetDocument } from '#shared/contract/document.ts';
import type { Finding, NetReading } from '#shared/contract/reading.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { findingsById } from '../model/entity-rows.ts';
import { RowActions } from './entity-table-parts.tsx';
import { removePoint, renamePoint, typePlace } from './schedule-edits.ts';
import { TableNumber, TableText } from './table-inputs.tsx';

export const placeHeads = ({ unitSystem, datum }: FlowNetDocument) =>
  [text.offset(unitNames(unitSystem).length), text.elevation(elevationUnit(unitSystem, datum))] as const;

type Entry<K extends 'readingPoint' | 'knownPoint'> = { readonly id: string; readonly value: EntityOf<K> };

interface PointTableProps<K extends 'readingPoint' | 'knownPoint'> {
  points: readonly Entry<K>[];
  document: FlowNetDocument;
  reading: NetReading | null;
  store: DeskStore;
  disabled: boolean;
  onShow: (kind: K, id: string) => void;
}

/** The places of the reading points; what they read stands in the schedule. */
export function ReadingPointTable(props: PointTableProps<'readingPoint'>) {
  const { points, document, reading, store, disabled, onShow } = props;
  const heads = placeHeads(document);
  const findings = findingsById(reading);
  return (
    <Table caption={text.readingPoints(points.length)} stacked>
      <PointHead heads={heads} />
      <tbody>
        {points.map(({ id, value }) => {
          const whose = value.name || text.unnamedPoint;
          const read = reading?.points.find((point) => point.id === id);
          const place = value.place.on === 'section' ? value.place : (read ?? NOWHERE);
          const type = (typed: { offset?: number; elevation?: number }) => {
            const edit = read === undefined ? null : typePlace(value, read, typed);
            if (edit !== null) store.run(edit.label, edit.ops);
          };
          return (
            <tr key={id}>
              <NameCell
                whose={whose}
                name={value.name}
                disabled={disabled}
                onCommit={(name) => {
                  const edit = renamePoint(id, value, name);
                  store.run(edit.label, edit.ops);
                }}
              />
              <FigureCell
                label={text.fieldOf(heads[0], whose)}
                value={place.offset}
                disabled={disabled}
                onCommit={(offset) => offset !== null && type({ offset })}
              />
              <FigureCell
                label={text.fieldOf(heads[1], whose)}
                value={place.elevation}
                disabled={disabled}
                onCommit={(elevation) => elevation !== null && type({ elevation })}
              />
              <FindingsCell findings={findings.get(id)} />
              <RowActions
                whose={whose}
                onShow={() => onShow('readingPoint', id)}
                onRemove={
                  disabled
                    ? null
                    : () => {
                        const edit = removePoint(id, whose);
                        store.run(edit.label, edit.ops);
                      }
                }
              />
            </tr>
          );
        })}
      </tbody>
    </Table>
  );
}

const NOWHERE = { offset: null, elevation: null };

/** Known points: where they stand on the sheet, and what is known of them. */
export function KnownPointTable(props: PointTableProps<'knownPoint'>) {
  const { points, document, reading, store, disabled, onShow } = props;
  const heads = placeHeads(document);
  const findings = findingsById(reading);
  return (
    <Table caption={text.knownPoints(points.length)} stacked>
      <PointHead heads={[text.x, text.y, ...heads]} />
      <tbody>
        {points.map(({ id, value }) => {
          const whose = value.name || text.unnamedPoint;
          const [x, y] = value.at;
          const change = (changes: Partial<EntityOf<'knownPoint'>>) =>
            store.run(text.labels.knownPoint(whose), [
              { op: 'put', entityId: id, value: { ...value, ...changes } },
            ]);
          return (
            <tr key={id}>
              <NameCell
                whose={whose}
                name={value.name}
                disabled={disabled}
                onCommit={(name) => change({ name })}
              />
              <FigureCell
                label={text.fieldOf(text.x, whose)}
                value={x}
                decimals={1}
                disabled={disabled}
                onCommit={(next) => next !== null && change({ at: [next, y] })}
              />
              <FigureCell
                label={text.fieldOf(text.y, whose)}
                value={y}
                decimals={1}
                disabled={disabled}
                onCommit={(next) => next !== null && change({ at: [x, next] })}
              />
              <FigureCell
                label={text.fieldOf(heads[0], whose)}
                value={value.offset}
                disabled={disabled}
                optional
                onCommit={(offset) => change({ offset })}
              />
              <FigureCell
                label={text.fieldOf(heads[1], whose)}
                value={value.elevation}
                disabled={disabled}
                optional
                onCommit={(elevation) => change({ elevation })}
              />
              <FindingsCell findings={findings.get(id)} />
              <RowActions
                whose={whose}
                onShow={() => onShow('knownPoint', id)}
                onRemove={
                  disabled
                    ? null
                    : () => store.run(text.labels.removed(whose), [{ op: 'remove', entityId: id }])
                }
              />
            </tr>
          );
        })}
      </tbody>
    </Table>
  );
}

function PointHead({ heads }: { heads: readonly string[] }) {
  return (
    <thead>
      <tr>
        <HeadCell>{text.name}</HeadCell>
        {heads.map((head) => (
          <HeadCell key={head} numeric>
            {head}
          </HeadCell>
        ))}
        <HeadCell>{text.findings}</HeadCell>
        <HeadCell>{text.actions}</HeadCell>
      </tr>
    </thead>
  );
}

interface NameCellProps {
  whose: string;
  name: string;
  disabled: boolean;
  onCommit: (name: string) => void;
}

function NameCell({ whose, name, disabled, onCommit }: NameCellProps) {
  return (
    <th scope="row" className="border-b border-rule-2 px-3.5 py-[5px] text-left font-semibold">
      {disabled ? (
        whose
      ) : (
        <TableText label={text.fieldOf(text.name, whose)} value={name} maxLength={120} onCommit={onCommit} />
      )}
    </th>
  );
}

interface FigureCellProps {
  label: string;
  value: number | null;
  decimals?: number;
  optional?: boolean;
  disabled: boolean;
  onCommit: (value: number | null) => void;
}

function FigureCell({ label, value, decimals = 2, optional = false, disabled, onCommit }: FigureCellProps) {
  const shown = value === null ? '' : fixedText(value, decimals);
  return (
    <Cell numeric>
      {disabled ? (
        shown || text.nothingFound
      ) : (
        <TableNumber label={label} value={value} shown={shown} optional={optional} onCommit={onCommit} />
      )}
    </Cell>
  );
}

function FindingsCell({ findings = [] }: { findings?: readonly Finding[] | undefined }) {
  return <Cell>{findings.map((found) => sentenceText(found.text)).join(' ') || text.nothingFound}</Cell>;
}

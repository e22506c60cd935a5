import { useEffect, useMemo, useRef, useState } from 'react';
import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { classNames } from '#client/components/class-names.ts';
import { editingText, editLabels, editRefusals } from '#client/text/editing-lines.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { TracedLine } from '#shared/contract/document.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { Choice } from './form-fields.tsx';
import { VertexPages } from './vertex-pages.tsx';
import { VertexRow } from './vertex-row.tsx';
import { pageOf, type VertexUnits, withFigure, withPointAfter } from './vertex-rows.ts';

const text = editingText.vertices;
/** A line keeps two points at least, and holds no more than the document allows. */
const FEWEST = 2;
const MOST = 5000;

interface VertexTableProps {
  store: DeskStore;
  lineId: string;
  line: TracedLine;
  disabled: boolean;
}

/** Every point of a line by its figures, to be typed; the point chosen on the sheet is the one chosen here. */
export function VertexTable({ store, lineId, line, disabled }: VertexTableProps) {
  const document = useStore(store, (state) => state.document);
  const vertex = useStore(store, ({ selection }) => (selection.ids[0] === lineId ? selection.vertex : null));
  const map = useMemo(() => readSetOut(document).map, [document]);
  const [wanted, setWanted] = useState<VertexUnits>('section');
  const [at, setAt] = useState(0);
  const units = map === null ? 'sheet' : wanted;
  const count = line.points.length;
  const { first, last } = pageOf(at, count);
  const body = useRef<HTMLTableSectionElement>(null);

  // The point chosen on the sheet is brought into view in the table.
  useEffect(() => {
    if (vertex === null) return;
    setAt(vertex);
    requestAnimationFrame(() =>
      body.current?.querySelector('[aria-current]')?.scrollIntoView({ block: 'nearest' }),
    );
  }, [vertex]);

  const put = (label: string, value: TracedLine) =>
    store.run(label, [{ op: 'put', entityId: lineId, value }]);
  const choose = (index: number) => store.select({ kind: 'line', ids: [lineId], vertex: index });
  const show = (index: number) => {
    choose(index);
    store.lookAt(line.points[index]!);
  };
  const type = (index: number, axis: 0 | 1, figure: number) => {
    const value = withFigure(line, index, axis, figure, units, map);
    if (value === null) store.setNotice(text.tooFar);
    else put(editLabels.typedVertex(line, index + 1), value);
  };
  const insert = (index: number) => {
    const value = count < MOST ? withPointAfter(line, index) : null;
    if (value === null) store.setNotice(editRefusals.tooManyPoints(String(MOST)));
    else if (put(editLabels.insertedVertex(line), value).ok) choose(index + 1);
  };
  const remove = (index: number) =>
    put(editLabels.removedVertex(line), { ...line, points: line.points.filter((_, i) => i !== index) });

  const heads =
    units === 'sheet'
      ? ([text.x, text.y] as const)
      : ([
          text.offset(unitNames(document.unitSystem).length),
          text.elevation(elevationUnit(document.unitSystem, document.datum)),
        ] as const);
  return (
    <section aria-label={text.title(count)} className="border-t border-rule pt-3">
      <h3 className="mt-0 mb-2 text-sm font-semibold">{text.title(count)}</h3>
      {map === null ? null : (
        <Choice
          label={editingText.units.label}
          value={units}
          names={editingText.units.names}
          disabled={false}
          onCommit={setWanted}
        />
      )}
      <div className="mt-2 max-h-72 overflow-y-auto border-y border-rule">
        <table className="w-full table-fixed">
          <thead className="sticky top-0 bg-film">
            <tr>
              <th scope="col" className={classNames(HEAD, 'w-11 text-left')}>
                {text.number}
              </th>
              {heads.map((head) => (
                <th key={head} scope="col" className={classNames(HEAD, 'text-right')}>
                  {head}
                </th>
              ))}
            </tr>
          </thead>
          <tbody ref={body}>
            {numbersOf(first, last).map((index) => (
              <VertexRow
                key={`${index} ${units}`}
                index={index}
                at={line.points[index]!}
                units={units}
                map={map}
                heads={heads}
                chosen={vertex === index}
                disabled={disabled}
                onChoose={choose}
                onShow={show}
                onType={type}
              />
            ))}
          </tbody>
        </table>
      </div>
      <VertexPages first={first} last={last} count={count} onGo={setAt} />
      {disabled ? null : (
        <div className="mt-2 flex flex-wrap items-center gap-2">
          {vertex === null ? null : (
            <>
              <Button look="quiet" onClick={() => insert(vertex)}>
                {text.insertAfter(vertex + 1)}
              </Button>
              <Button look="quiet" disabled={count <= FEWEST} onClick={() => remove(vertex)}>
                {text.removeNamed(vertex + 1)}
              </Button>
            </>
          )}
          <p className="m-0 text-sm text-ink-2">{text.hint}</p>
        </div>
      )}
    </section>
  );
}

const HEAD = 'border-b border-rule px-1.5 py-[3px] text-sm font-semibold text-ink-2';

/** A point has no name but its number along the line. */
const numbersOf = (first: number, last: number) =>
  Array.from({ length: last - first + 1 }, (_, i) => first + i);

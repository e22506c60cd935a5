import type { SheetBlock, SheetDiagram, SheetFact } from '#shared/text/calculation-sheet/content.ts';
import { richRuns } from '#shared/text/calculation-sheet/rich-text.ts';

/** A text with its raised and lowered runs. */
export function Rich({ text }: { text: string }) {
  return richRuns(text).map((run, i) => {
    // Runs have no identity of their own but their place in the text.
    const key = `${i} ${run.text}`;
    if (run.level === 'raised') return <sup key={key}>{run.text}</sup>;
    if (run.level === 'lowered') return <sub key={key}>{run.text}</sub>;
    return <span key={key}>{run.text}</span>;
  });
}

/** Labels with their values. */
export function Facts({ rows }: { rows: readonly SheetFact[] }) {
  return (
    <dl className="m-0 grid grid-cols-[minmax(110px,1fr)_minmax(0,2fr)] gap-x-3 gap-y-0.5">
      {rows.map(({ label, value }) => (
        <div key={label} className="contents">
          <dt className="text-ink-2">{label}</dt>
          <dd className="m-0 whitespace-pre-line [overflow-wrap:anywhere]">
            <Rich text={value} />
          </dd>
        </div>
      ))}
    </dl>
  );
}

/** One block of a chapter, as the PDF sets it. */
export function Block({ block }: { block: SheetBlock }) {
  if (block.kind === 'paragraph')
    return (
      <p className="my-1">
        <Rich text={block.text} />
      </p>
    );
  if (block.kind === 'list')
    return (
      <ul className="my-1 pl-5">
        {block.items.map((item) => (
          <li key={item} className="whitespace-pre-line">
            <Rich text={item} />
          </li>
        ))}
      </ul>
    );
  if (block.kind === 'facts') return <Facts rows={block.rows} />;
  if (block.kind === 'table') return <BlockTable table={block} />;
  if (block.kind === 'diagram') return <Diagram diagram={block.diagram} />;
  return (
    <div className="my-2 flex">
      {block.boxes.map(({ label, value }) => (
        <div key={label} className="-ml-px min-h-24 flex-1 border border-ink p-1 text-sm text-ink-2">
          {label} {value}
        </div>
      ))}
    </div>
  );
}

function BlockTable({ table }: { table: Extract<SheetBlock, { kind: 'table' }> }) {
  const align = (i: number) => (table.columns[i]?.align === 'right' ? 'text-right' : 'text-left');
  return (
    <div className="my-2 overflow-x-auto">
      <table className="w-full border-collapse text-sm tabular-nums">
        <caption className="text-left text-ink-2">{table.caption}</caption>
        <thead>
          <tr>
            {table.columns.map(({ label }, i) => (
              <th key={label} scope="col" className={`border-b border-ink-2 px-1 align-bottom ${align(i)}`}>
                {label}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {table.rows.map((row, at) => (
            // A table that never changes: rows are known by their place.
            // biome-ignore lint/suspicious/noArrayIndexKey: rows of a frozen table keep their places
            <tr key={at} className="break-inside-avoid">
              {table.columns.map(({ label }, i) => (
                <td key={label} className={`border-b border-rule-2 px-1 ${align(i)}`}>
                  <Rich text={row[i] ?? ''} />
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

const [WIDE, HIGH] = [600, 160];

/** The curve of a profile; its figures stand in the table below it. */
function Diagram({ diagram }: { diagram: SheetDiagram }) {
  const { points, caption, across, up } = diagram;
  const along = points.map(([x]) => x);
  const known = points.flatMap(([, y]) => (y === null ? [] : [y]));
  const [x0, x1] = [Math.min(...along), Math.max(...along)];
  const [y0, y1] = [Math.min(0, ...known), Math.max(0, ...known)];
  const place = (x: number, y: number) =>
    `${((x - x0) / (x1 - x0 || 1)) * WIDE},${HIGH - ((y - y0) / (y1 - y0 || 1)) * HIGH}`;
  let isOn = false;
  const path = points
    .map(([x, y]) => {
      const step = y === null ? '' : `${isOn ? 'L' : 'M'}${place(x, y)}`;
      isOn = y !== null;
      return step;
    })
    .join('');
  return (
    <figure className="my-2">
      <figcaption className="font-semibold">{`${caption} (${up} over ${across})`}</figcaption>
      <svg viewBox={`0 0 ${WIDE} ${HIGH}`} aria-hidden className="block h-auto w-full border border-rule">
        <path d={path} fill="none" stroke="var(--color-equipotential)" strokeWidth={1.5} />
      </svg>
    </figure>
  );
}

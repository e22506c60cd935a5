import type { SheetBlock } from '#shared/text/calculation-sheet/content.ts';
import { drawLine, LEADING, type PageFlow } from './page-flow.ts';
import { GREY, INK, RULE } from './print-colours.ts';
import { type TextLine, textLines } from './text-lines.ts';

type Table = Extract<SheetBlock, { kind: 'table' }>;

const CELL_PT = 8;
const PAD_PT = 2.5;

/** A table with its caption; the head is repeated where it goes on in another column or on another page. */
export function drawTable(flow: PageFlow, { caption, columns, rows }: Table): void {
  const whole = columns.reduce((sum, column) => sum + column.weight, 0);
  const widths = columns.map((column) => (column.weight / whole) * flow.widthPt);
  const broken = (cells: readonly string[], style: 'plain' | 'bold') =>
    columns.map((_, i) =>
      textLines(flow.fonts, cells[i] ?? '', style, CELL_PT, (widths[i] ?? 0) - 2 * PAD_PT),
    );
  const head = broken(
    columns.map((column) => column.label),
    'bold',
  );
  const headHeight = heightOf(head);
  flow.need(CELL_PT * LEADING + headHeight + 2 * CELL_PT * LEADING);
  flow.text(caption, { sizePt: CELL_PT, colour: GREY });
  const drawHead = () => drawRow(flow, head, { columns, widths, colour: INK, rule: GREY });
  drawHead();
  for (const cells of rows) {
    const row = broken(cells, 'plain');
    const before = [flow.x(), flow.y()];
    flow.need(heightOf(row));
    if (flow.x() !== before[0] || flow.y() !== before[1]) drawHead();
    drawRow(flow, row, { columns, widths, colour: INK, rule: RULE });
  }
}

const heightOf = (row: readonly TextLine[][]) =>
  Math.max(1, ...row.map((lines) => lines.length)) * CELL_PT * LEADING + PAD_PT;

interface RowLook {
  columns: Table['columns'];
  widths: readonly number[];
  colour: string;
  rule: string;
}

function drawRow(flow: PageFlow, row: readonly TextLine[][], look: RowLook): void {
  let x = flow.x();
  row.forEach((lines, i) => {
    const width = look.widths[i] ?? 0;
    lines.forEach((line, at) => {
      const shift = look.columns[i]?.align === 'right' ? width - PAD_PT - line.widthPt : PAD_PT;
      drawLine(flow.doc, line, x + shift, flow.y() + 1 + at * CELL_PT * LEADING, CELL_PT, look.colour);
    });
    x += width;
  });
  flow.advance(heightOf(row));
  flow.doc
    .lineWidth(0.4)
    .strokeColor(look.rule)
    .moveTo(flow.x(), flow.y())
    .lineTo(flow.x() + flow.widthPt, flow.y())
    .stroke();
}

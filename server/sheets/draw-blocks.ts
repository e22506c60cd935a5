import type {
  SheetBlock,
  SheetChapter,
  SheetDiagram,
  SheetFact,
} from '#shared/text/calculation-sheet/content.ts';
import { drawTable } from './draw-table.ts';
import { drawLine, LEADING, mm, type PageFlow, TEXT_PT } from './page-flow.ts';
import { GREY, INK, RULE } from './print-colours.ts';
import { textLines } from './text-lines.ts';

const AFTER_PT = 5;
const SMALL_PT = 7.5;

/** Sets a chapter: heading, outline entry, blocks. */
export function drawChapter(flow: PageFlow, chapter: SheetChapter): void {
  flow.need(mm(28));
  flow.advance(6);
  flow.doc.addNamedDestination(chapter.id, 'XYZ', 0, flow.y(), null);
  flow.doc.outline.addItem(chapter.title);
  flow.text(chapter.title, { style: 'bold', sizePt: 12 });
  flow.advance(3);
  for (const block of chapter.blocks) {
    drawBlock(flow, block);
    flow.advance(AFTER_PT);
  }
}

function drawBlock(flow: PageFlow, block: SheetBlock): void {
  if (block.kind === 'paragraph') flow.text(block.text);
  else if (block.kind === 'list') for (const item of block.items) drawItem(flow, item);
  else if (block.kind === 'facts') drawFacts(flow, block.rows);
  else if (block.kind === 'table') drawTable(flow, block);
  else if (block.kind === 'diagram') drawDiagram(flow, block.diagram);
  else drawBoxes(flow, block.boxes);
}

function drawItem(flow: PageFlow, item: string): void {
  flow.need(TEXT_PT * LEADING);
  const [dash] = textLines(flow.fonts, '–', 'plain', TEXT_PT, 20);
  if (dash) drawLine(flow.doc, dash, flow.x(), flow.y(), TEXT_PT, GREY);
  flow.text(item, { indentPt: 10 });
  flow.advance(1.5);
}

/** Labels at the left, values at the right of them, both broken into lines. */
function drawFacts(flow: PageFlow, rows: readonly SheetFact[]): void {
  const labelWidth = flow.widthPt * 0.3;
  for (const { label, value } of rows) {
    const left = textLines(flow.fonts, label, 'plain', TEXT_PT, labelWidth - 8);
    const right = textLines(flow.fonts, value, 'plain', TEXT_PT, flow.widthPt - labelWidth);
    const height = TEXT_PT * LEADING;
    for (let i = 0; i < Math.max(left.length, right.length); i += 1) {
      flow.need(height);
      const [name, held] = [left[i], right[i]];
      if (name) drawLine(flow.doc, name, flow.x(), flow.y(), TEXT_PT, GREY);
      if (held) drawLine(flow.doc, held, flow.x() + labelWidth, flow.y(), TEXT_PT, INK);
      flow.advance(height);
    }
    flow.advance(1);
  }
}

/** Empty boxes to be filled in by hand. */
function drawBoxes(flow: PageFlow, boxes: readonly SheetFact[]): void {
  const height = mm(26);
  flow.need(height);
  const width = flow.widthPt / boxes.length;
  boxes.forEach(({ label, value }, i) => {
    const x = flow.x() + i * width;
    flow.doc.lineWidth(0.6).strokeColor(INK).rect(x, flow.y(), width, height).stroke();
    const lines = [label, value].flatMap((text) => textLines(flow.fonts, text, 'plain', SMALL_PT, width - 8));
    lines.forEach((line, row) => {
      drawLine(flow.doc, line, x + 4, flow.y() + 3 + row * SMALL_PT * LEADING, SMALL_PT, GREY);
    });
  });
  flow.advance(height);
}

/** A curve over a distance, with the ends of both axes named. */
function drawDiagram(flow: PageFlow, diagram: SheetDiagram): void {
  const height = mm(42);
  flow.need(height + mm(16));
  flow.text(diagram.caption, { style: 'bold', sizePt: SMALL_PT + 0.5 });
  flow.advance(4);
  const known = diagram.points.flatMap(([, up]) => (up === null ? [] : [up]));
  const [across0, across1] = extent(diagram.points.map(([across]) => across));
  const [up0, up1] = extent([0, ...known]);
  const box = { x: flow.x() + mm(14), y: flow.y(), width: flow.widthPt - mm(16), height };
  const place = (across: number, up: number): [number, number] => [
    box.x + ((across - across0) / (across1 - across0)) * box.width,
    box.y + box.height - ((up - up0) / (up1 - up0)) * box.height,
  ];
  const { doc } = flow;
  doc.lineWidth(0.5).strokeColor(RULE).rect(box.x, box.y, box.width, box.height).stroke();
  const [zeroX, zeroY] = place(across0, 0);
  doc
    .strokeColor(GREY)
    .moveTo(zeroX, zeroY)
    .lineTo(zeroX + box.width, zeroY)
    .stroke();
  doc.lineWidth(1.1).strokeColor('#0f6b66');
  let isOn = false;
  for (const [across, up] of diagram.points) {
    if (up === null) isOn = false;
    else {
      const [x, y] = place(across, up);
      if (isOn) doc.lineTo(x, y);
      else doc.moveTo(x, y);
      isOn = true;
    }
  }
  doc.stroke();
  const say = (text: string, x: number, y: number) => {
    const [line] = textLines(flow.fonts, text, 'plain', SMALL_PT, mm(60));
    if (line) drawLine(doc, line, x, y, SMALL_PT, GREY);
  };
  say(axisText(up1), flow.x(), box.y - 3);
  say(axisText(up0), flow.x(), box.y + box.height - 8);
  say(diagram.up, flow.x(), box.y + box.height / 2 - 6);
  say(axisText(across0), box.x, box.y + box.height + 2);
  say(axisText(across1), box.x + box.width - mm(10), box.y + box.height + 2);
  say(diagram.across, box.x + box.width / 2 - mm(8), box.y + box.height + 2);
  flow.advance(height + SMALL_PT * 1.8);
}

/** Lowest and highest, a unit apart at least, so that a level curve has a place. */
function extent(values: readonly number[]): [number, number] {
  const low = values.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  const high = values.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);
  if (!Number.isFinite(low)) return [0, 1];
  return high > low ? [low, high] : [low, low + 1];
}

const axisText = (value: number) => String(Number(value.toPrecision(4))).replace('-', '−');

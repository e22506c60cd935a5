import { fixedText, plusMinusText } from '#client/lib/figures.ts';
import { exitsText } from '#client/text/exits.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { HeaveReading } from '#shared/contract/reading-quantities.ts';
import { DECIMALS, unitNames } from '#shared/text/unit-text.ts';
import { lineNameOf } from './line-names.ts';
import { PlainTable } from './plain-table.tsx';

const text = exitsText.heave;

/** The prism of soil beside each wall at which water leaves. */
export function HeaveTable({
  document,
  heave,
}: {
  document: FlowNetDocument;
  heave: readonly HeaveReading[];
}) {
  const { length } = unitNames(document.unitSystem);
  const columns = [
    { head: text.wall, words: true },
    { head: text.depth(length) },
    { head: text.width(length) },
    { head: text.excess(length) },
    { head: text.factor },
    { head: text.remark, words: true },
  ];
  const rows = heave.map((each) => ({
    key: `${each.wall} ${each.outlet}`,
    cells: [
      lineNameOf(document, each.wall),
      fixedText(each.depth, 2),
      fixedText(each.width, 2),
      plusMinusText(each.meanExcessHead, each.meanExcessHeadPlusMinus, DECIMALS[document.unitSystem].head),
      fixedText(each.factor, 1),
      each.note,
    ],
  }));
  return <PlainTable caption={text.title} columns={columns} rows={rows} />;
}

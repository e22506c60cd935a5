import { useMemo } from 'react';
import { Panel } from '#client/components/panel.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { ChangedThings } from '#client/features/revisions/components/revision-changes.tsx';
import { NO_FIGURE, plainText, sentenceText } from '#client/lib/figures.ts';
import { compareText as text } from '#client/text/compare.ts';
import { alignedWith } from '#shared/compute/compare-figures/align-nets.ts';
import { compareRevisions, type FrozenNet } from '#shared/compute/compare-revisions.ts';
import { SECTION_KINDS } from '#shared/contract/document.ts';
import type { ChangedFact } from '#shared/contract/revision-comparison.ts';
import type { ComparedNet } from './compared-net.ts';

interface ComparedChangesProps {
  one: ComparedNet;
  other: ComparedNet;
}

/** Lines and inputs that are otherwise in the second net. Lines are told only on one sheet, where they can be held over each other. */
export function ComparedChanges({ one, other }: ComparedChangesProps) {
  const sameUnits = one.document.unitSystem === other.document.unitSystem;
  const onOneSheet = one.sheet.id === other.sheet.id;
  const sameSection = one.section.id === other.section.id;
  const comparison = useMemo(() => {
    if (!sameUnits) return null;
    const [a, b] = sameSection ? [one, other] : [withoutSection(one), withoutSection(other)];
    return compareRevisions(a, alignedWith(a, b));
  }, [sameUnits, sameSection, one, other]);
  if (comparison === null)
    return (
      <Panel title={text.changes} look="register">
        <p className="m-0 px-3.5 py-3 text-ink-2">{text.changesUnits}</p>
      </Panel>
    );
  const { inputs, lines, points } = comparison;
  const things = onOneSheet ? lines.length + points.length : 0;
  return (
    <Panel title={text.changes} look="register">
      {inputs.length + things === 0 ? <p className="m-0 px-3.5 py-3">{text.noChanges}</p> : null}
      {inputs.length > 0 ? <Inputs inputs={inputs} one={one.name} other={other.name} /> : null}
      {things > 0 ? (
        <div className="px-3.5 py-2.5">
          <p className="m-0 mb-1 text-ink-2">{text.changesLead(other.name)}</p>
          <ChangedThings comparison={comparison} unitSystem={one.document.unitSystem} />
        </div>
      ) : null}
    </Panel>
  );
}

/** Known points and set-out of another section are others by the nature of the thing. */
function withoutSection({ document, reading }: ComparedNet): FrozenNet {
  const entities = Object.entries(document.entities).filter(
    ([, { value }]) => !SECTION_KINDS.includes(value.kind),
  );
  return { document: { ...document, entities: Object.fromEntries(entities) }, reading };
}

function Inputs({ inputs, one, other }: { inputs: readonly ChangedFact[]; one: string; other: string }) {
  return (
    <Table caption={text.inputs}>
      <thead>
        <tr>
          <HeadCell>{text.inputs}</HeadCell>
          <HeadCell>{one}</HeadCell>
          <HeadCell>{other}</HeadCell>
        </tr>
      </thead>
      <tbody>
        {inputs.map(({ label, before, after }) => (
          <tr key={`${label} ${before} ${after}`}>
            <th scope="row" className="border-b border-rule-2 px-3.5 py-[5px] text-left font-normal">
              {label}
            </th>
            <Cell>{entered(before)}</Cell>
            <Cell>{entered(after)}</Cell>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

/** As it was entered, to six figures. */
function entered(value: ChangedFact['before']): string {
  if (typeof value === 'number') return plainText(value, 6);
  return value === null || value === '' ? NO_FIGURE : sentenceText(value);
}

import { useMemo } from 'react';
import { TitleBlock } from '#client/features/desk/components/title-block.tsx';
import { titleBlockCells } from '#client/features/desk/components/title-block-cells.ts';
import { TickBox } from '#client/features/revisions/components/tick-box.tsx';
import { formatFullDay } from '#client/lib/dates.ts';
import { shortName } from '#client/lib/initials.ts';
import { revisionStateText } from '#client/text/revisions.ts';
import { titleBlockText as text } from '#client/text/title-block.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { cellKey } from '#shared/text/figures-to-check.ts';

/** The title block of the frozen record; its figures are the payload's. */
export function FrozenTitleBlock({ revision }: { revision: RevisionDto }) {
  const cells = useMemo(() => {
    const { payload, summary } = revision;
    const drawn = payload.drawnBy.map((person) => shortName(person.name)).join(', ');
    return titleBlockCells(payload.document, payload.reading, {
      damName: payload.dam.name,
      section: payload.section,
      drawn: `${drawn || text.notDrawn}, ${formatFullDay(payload.sentAt)}`,
      checked: checkedIn(summary),
      calculation: summary.label,
    });
  }, [revision]);
  return (
    <TitleBlock
      cells={cells}
      stale={false}
      open={null}
      onStep={null}
      markOf={(cell) => <TickBox figureKey={cellKey(cell)} />}
    />
  );
}

function checkedIn({ state, decision, decisions, reviewers }: RevisionDto['summary']): string {
  const signed = (signedName: string, name: string) => shortName(signedName || name);
  if (state === 'accepted' || state === 'acceptedWithNotes') {
    // Each of several reviewers has checked it.
    const names = decisions.map((each) => signed(each.signedName, each.decidedBy.name));
    return revisionStateText[state](names.join(', '));
  }
  const name = decision ? signed(decision.signedName, decision.decidedBy.name) : null;
  return revisionStateText[state](name ?? reviewers.map((each) => shortName(each.name)).join(', '));
}

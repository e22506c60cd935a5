import { useMemo } from 'react';
import { TitleBlock } from '#client/features/desk/components/title-block.tsx';
import { titleBlockCells } from '#client/features/desk/components/title-block-cells.ts';
import { formatFullDay } from '#client/lib/dates.ts';
import { shortName } from '#client/lib/initials.ts';
import { titleBlockText as text } from '#client/text/title-block.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';

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
  return <TitleBlock cells={cells} stale={false} open={null} onStep={null} />;
}

function checkedIn({ decision, reviewer }: RevisionDto['summary']): string {
  const name = shortName((decision?.decidedBy ?? reviewer).name);
  return text.checkedBy[decision?.decision ?? 'sent'](name);
}

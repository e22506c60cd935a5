import type { TitleFacts } from '#client/features/desk/components/title-block-cells.ts';
import { checkedText } from '#client/features/desk/components/title-block-cells.ts';
import { formatFullDay } from '#client/lib/dates.ts';
import { shortName } from '#client/lib/initials.ts';
import { titleBlockText as text } from '#client/text/title-block.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';

/**
 * What the title block says besides document and reading. `savedAt`: when this person last saved here, which makes
 * them one of those who drew before the net is loaded again.
 */
export function titleFactsOf(
  detail: NetDetailDto,
  person: { id: string; name: string } | null,
  savedAt: number | null,
): TitleFacts {
  const drew = new Map(detail.drawnBy.map((each) => [each.id, each.name]));
  if (savedAt !== null && person) drew.set(person.id, person.name);
  const names = [...drew.values()].map(shortName).join(', ');
  const last = Math.max(Date.parse(detail.updatedAt), savedAt ?? 0);
  return {
    damName: detail.dam.name,
    section: detail.section,
    drawn: names === '' ? text.notDrawn : `${names}, ${formatFullDay(new Date(last).toISOString())}`,
    checked: checkedText(detail.net),
    checkedBefore: detail.net.changedSinceRevision ?? false,
    calculation: text.revisions(detail.revisionCount),
  };
}

import { useSuspenseQuery } from '@tanstack/react-query';
import { Empty, PanelItem, PanelList } from '#client/components/panel.tsx';
import { damsText as text } from '#client/text/dams.ts';
import { memberListQuery } from '../api/dam-queries.ts';

/** Who has a part on the dam, for the side of its page. */
export function PeopleList({ damId }: { damId: string }) {
  const { data: members } = useSuspenseQuery(memberListQuery(damId));
  const present = members.filter((member) => member.state !== 'deactivated');
  if (present.length === 0) return <Empty>{text.noPeople}</Empty>;
  return (
    <PanelList>
      {present.map((member) => (
        <PanelItem key={member.person.id}>
          {member.person.name || member.email}
          <span className="block text-ink-2">
            {text.roles(member.roles)}
            {member.state === 'invited' ? `, ${text.invited}` : ''}
          </span>
        </PanelItem>
      ))}
    </PanelList>
  );
}

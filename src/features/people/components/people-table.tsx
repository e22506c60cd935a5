import { useSuspenseQuery } from '@tanstack/react-query';
import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { formatFullDay } from '#client/lib/dates.ts';
import { peopleText as text } from '#client/text/people.ts';
import type { PersonDto } from '#shared/contract/people.ts';
import { peopleQuery, useChangePerson } from '../api/people-queries.ts';

export function PeopleTable({ ownPersonId }: { ownPersonId: string }) {
  const { data: people } = useSuspenseQuery(peopleQuery());
  return (
    <Table caption={text.caption} stacked>
      <thead>
        <tr>
          <HeadCell>{text.person}</HeadCell>
          <HeadCell>{text.part}</HeadCell>
          <HeadCell>{text.state}</HeadCell>
          <HeadCell>{text.since}</HeadCell>
          <HeadCell>
            <span className="sr-only">{text.changes}</span>
          </HeadCell>
        </tr>
      </thead>
      <tbody>
        {people.map((person) => (
          <PersonRow key={person.id} person={person} isSelf={person.id === ownPersonId} />
        ))}
      </tbody>
    </Table>
  );
}

function PersonRow({ person, isSelf }: { person: PersonDto; isSelf: boolean }) {
  const change = useChangePerson(person.id);
  return (
    <tr>
      <Cell className="align-top">
        <span className="font-semibold">{person.name || person.email}</span>
        {isSelf ? ` (${text.you})` : ''}
        <span className="block text-sm text-ink-2">{person.email}</span>
        <ProblemNote error={change.error} />
      </Cell>
      <Cell className="align-top">{person.admin ? text.administrator : text.member}</Cell>
      <Cell className="align-top">{text.stateName(person.state)}</Cell>
      <Cell className="align-top whitespace-nowrap">{formatFullDay(person.createdAt)}</Cell>
      <Cell className="align-top">{isSelf ? null : <PersonActions person={person} change={change} />}</Cell>
    </tr>
  );
}

function PersonActions({
  person,
  change,
}: {
  person: PersonDto;
  change: ReturnType<typeof useChangePerson>;
}) {
  const notice = useNotice();
  const name = person.name || person.email;
  const apply = (part: { admin?: boolean; active?: boolean }) =>
    change.mutate(part, { onSuccess: () => notice(text.done(name)) });
  const isActive = person.state !== 'deactivated';
  return (
    <div className="flex flex-wrap sm:justify-end gap-2">
      <Button
        look="quiet"
        aria-label={person.admin ? text.makeMemberOf(name) : text.makeAdminOf(name)}
        onClick={() => apply({ admin: !person.admin })}
      >
        {person.admin ? text.makeMember : text.makeAdmin}
      </Button>
      <Button
        look="quiet"
        aria-label={isActive ? text.deactivateOf(name) : text.activateOf(name)}
        onClick={() => apply({ active: !isActive })}
      >
        {isActive ? text.deactivate : text.activate}
      </Button>
    </div>
  );
}

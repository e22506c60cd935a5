import { useSuspenseQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { Empty } from '#client/components/panel.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { damSettingsText as settings } from '#client/text/dam-settings.ts';
import { damsText as text } from '#client/text/dams.ts';
import type { MemberDto } from '#shared/contract/dams.ts';
import { useRemoveMember, useSetRoles } from '../api/dam-mutations.ts';
import { memberListQuery } from '../api/dam-queries.ts';
import { RoleChecks } from './role-checks.tsx';

interface MemberTableProps {
  damId: string;
  ownPersonId: string;
  canManage: boolean;
}

/** The people of a dam and their parts. */
export function MemberTable({ damId, ownPersonId, canManage }: MemberTableProps) {
  const { data: members } = useSuspenseQuery(memberListQuery(damId));
  if (members.length === 0) return <Empty>{text.noPeople}</Empty>;
  return (
    <Table caption={text.people} stacked>
      <thead>
        <tr>
          <HeadCell>{settings.person}</HeadCell>
          <HeadCell>{settings.parts}</HeadCell>
          {canManage ? (
            <HeadCell>
              <span className="sr-only">{settings.removePerson}</span>
            </HeadCell>
          ) : null}
        </tr>
      </thead>
      <tbody>
        {members.map((member) => (
          <MemberRow
            // Parts chosen but not saved are forgotten when the saved ones change.
            key={`${member.person.id} ${member.roles.join()}`}
            damId={damId}
            member={member}
            isSelf={member.person.id === ownPersonId}
            canManage={canManage}
          />
        ))}
      </tbody>
    </Table>
  );
}

interface MemberRowProps {
  damId: string;
  member: MemberDto;
  isSelf: boolean;
  canManage: boolean;
}

function MemberRow({ damId, member, isSelf, canManage }: MemberRowProps) {
  const name = member.person.name || member.email;
  const notice = useNotice();
  const remove = useRemoveMember(damId);
  const removed = () => notice(settings.removed(name));
  return (
    <tr>
      <Cell className="align-top">
        <span className="font-semibold">{name}</span>
        {isSelf ? ` (${settings.you})` : ''}
        <span className="block text-sm text-ink-2">
          {member.email}
          {member.state === 'invited' ? `, ${text.invited}` : ''}
          {member.state === 'deactivated' ? `, ${settings.deactivated}` : ''}
        </span>
        <ProblemNote error={remove.error} />
      </Cell>
      <Cell className="align-top">
        {canManage ? <RoleEditor damId={damId} member={member} name={name} /> : text.roles(member.roles)}
      </Cell>
      {canManage ? (
        <Cell className="text-right align-top">
          <Button
            look="quiet"
            aria-label={settings.removeFrom(name)}
            busy={remove.isPending}
            onClick={() => remove.mutate(member.person.id, { onSuccess: removed })}
          >
            {settings.removePerson}
          </Button>
        </Cell>
      ) : null}
    </tr>
  );
}

function RoleEditor({ damId, member, name }: { damId: string; member: MemberDto; name: string }) {
  const [roles, setRoles] = useState(member.roles);
  const notice = useNotice();
  const setSaved = useSetRoles(damId);
  const isChanged = roles.join() !== member.roles.join();
  const save = () =>
    setSaved.mutate(
      { personId: member.person.id, roles },
      { onSuccess: () => notice(settings.partsSaved(name)) },
    );
  return (
    <>
      <RoleChecks legend={settings.partsOf(name)} roles={roles} onChange={setRoles} />
      <ProblemNote error={setSaved.error} />
      {isChanged && roles.length === 0 ? <p className="m-0 text-sm text-wrong">{settings.onePart}</p> : null}
      {isChanged && roles.length > 0 ? (
        <Button className="mt-1.5" busy={setSaved.isPending} onClick={save}>
          {settings.saveParts}
        </Button>
      ) : null}
    </>
  );
}

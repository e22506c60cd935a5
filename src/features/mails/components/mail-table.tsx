import { useSuspenseInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { Empty } from '#client/components/panel.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { formatMoment } from '#client/lib/dates.ts';
import { paths } from '#client/lib/paths.ts';
import { commonText } from '#client/text/common.ts';
import { mailsText as text } from '#client/text/mails.ts';
import type { MailDto } from '#shared/contract/mails.ts';
import { mailListQuery } from '../api/mail-queries.ts';

const STATE_LOOKS: Record<MailDto['state'], string> = {
  waiting: 'text-attention',
  sent: 'text-good',
  failed: 'text-wrong',
};

export function MailTable() {
  const { data, hasNextPage, fetchNextPage, isFetchingNextPage } = useSuspenseInfiniteQuery(mailListQuery());
  const mails = data.pages.flatMap((page) => page.items);
  if (mails.length === 0) return <Empty>{text.none}</Empty>;
  return (
    <>
      <Table caption={text.caption}>
        <thead>
          <tr>
            <HeadCell>{text.subject}</HeadCell>
            <HeadCell>{text.to}</HeadCell>
            <HeadCell>{text.state}</HeadCell>
            <HeadCell>{text.written}</HeadCell>
          </tr>
        </thead>
        <tbody>
          {mails.map((mail) => (
            <tr key={mail.id}>
              <Cell className="min-w-[240px]">
                <Link to={paths.mail(mail.id)} className="touch inline-flex items-center">
                  {mail.subject}
                </Link>
              </Cell>
              <Cell>{mail.to}</Cell>
              <Cell className={`whitespace-nowrap ${STATE_LOOKS[mail.state]}`}>
                {text.stateName(mail.state)}
                {mail.state !== 'sent' && mail.attempts > 0 ? `, ${text.attempts(mail.attempts)}` : ''}
              </Cell>
              <Cell className="whitespace-nowrap">{formatMoment(mail.createdAt)}</Cell>
            </tr>
          ))}
        </tbody>
      </Table>
      {hasNextPage ? (
        <div className="p-3.5">
          <Button
            busy={isFetchingNextPage}
            busyLabel={commonText.loading}
            onClick={() => void fetchNextPage()}
          >
            {text.more}
          </Button>
        </div>
      ) : null}
    </>
  );
}

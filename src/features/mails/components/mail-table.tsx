import { useSuspenseInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { MoreButton } from '#client/components/more-button.tsx';
import { Empty } from '#client/components/panel.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { formatMoment } from '#client/lib/dates.ts';
import { paths } from '#client/lib/paths.ts';
import { mailsText as text } from '#client/text/mails.ts';
import type { MailDto } from '#shared/contract/mails.ts';
import { mailListQuery } from '../api/mail-queries.ts';

const STATE_LOOKS: Record<MailDto['state'], string> = {
  waiting: 'text-attention',
  sent: 'text-good',
  failed: 'text-wrong',
};

export function MailTable() {
  const query = useSuspenseInfiniteQuery(mailListQuery());
  const mails = query.data.pages.flatMap((page) => page.items);
  if (mails.length === 0) return <Empty>{text.none}</Empty>;
  return (
    <>
      <Table caption={text.caption} stacked>
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
              <Cell className="sm:min-w-[240px]">
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
      <MoreButton label={text.more} query={query} />
    </>
  );
}

import { useSuspenseInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { MoreButton } from '#client/components/more-button.tsx';
import { Empty } from '#client/components/panel.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { formatMoment } from '#client/lib/dates.ts';
import { paths } from '#client/lib/paths.ts';
import { mailsText as text } from '#client/text/mails.ts';
import type { MailDto, MailState } from '#shared/contract/mails.ts';
import { mailListQuery } from '../api/mail-queries.ts';
import { SendAgain } from './send-again.tsx';

const STATE_LOOKS: Record<MailState, string> = {
  waiting: 'text-attention',
  sent: 'text-good',
  failed: 'text-wrong',
  held: 'text-attention',
  inDigest: 'text-good',
  dropped: 'text-ink-2',
};

/** Mails in one state or in all; those that were given up are sent again from here by whoever may. */
export function MailTable({ state, maySendAgain }: { state: MailState | null; maySendAgain: boolean }) {
  const query = useSuspenseInfiniteQuery(mailListQuery(state));
  const mails = query.data.pages.flatMap((page) => page.items);
  if (mails.length === 0) return <Empty>{state ? text.noneOfState : text.none}</Empty>;
  const hasActions = maySendAgain && mails.some((mail) => mail.state === 'failed');
  return (
    <>
      <Table caption={text.caption} stacked>
        <thead>
          <tr>
            <HeadCell>{text.subject}</HeadCell>
            <HeadCell>{text.to}</HeadCell>
            <HeadCell>{text.state}</HeadCell>
            <HeadCell>{text.written}</HeadCell>
            {hasActions ? (
              <HeadCell>
                <span className="sr-only">{text.action}</span>
              </HeadCell>
            ) : null}
          </tr>
        </thead>
        <tbody>
          {mails.map((mail) => (
            <MailRow key={mail.id} mail={mail} hasActions={hasActions} />
          ))}
        </tbody>
      </Table>
      <MoreButton label={text.more} query={query} />
    </>
  );
}

function MailRow({ mail, hasActions }: { mail: MailDto; hasActions: boolean }) {
  const { state, attempts } = mail;
  return (
    <tr>
      <Cell className="sm:min-w-[15rem]">
        <Link to={paths.mail(mail.id)} className="touch inline-flex items-center">
          {mail.subject}
        </Link>
      </Cell>
      <Cell>{mail.to}</Cell>
      <Cell className={STATE_LOOKS[state]}>
        {text.stateName(state)}
        {(state === 'waiting' || state === 'failed') && attempts > 0 ? `, ${text.attempts(attempts)}` : ''}
        {mail.lastError ? (
          <span className="block max-w-[40ch] text-sm break-words text-ink-2">{mail.lastError}</span>
        ) : null}
      </Cell>
      <Cell className="whitespace-nowrap">{formatMoment(mail.createdAt)}</Cell>
      {hasActions ? <Cell>{state === 'failed' ? <SendAgain mail={mail} inList /> : null}</Cell> : null}
    </tr>
  );
}

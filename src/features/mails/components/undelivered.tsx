import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { paths } from '#client/lib/paths.ts';
import { mailsText as text } from '#client/text/mails.ts';
import { failedMailsQuery } from '../api/mail-queries.ts';

/** Tells an administrator on every page that mails have been given up; nothing while all is well. */
export function Undelivered() {
  const { data: failed = 0 } = useQuery(failedMailsQuery());
  if (failed === 0) return null;
  return (
    <Link to={paths.failedMails} className="touch inline-flex items-center text-sm text-wrong">
      {text.undelivered(failed)}
    </Link>
  );
}

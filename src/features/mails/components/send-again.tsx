import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { mailsText as text } from '#client/text/mails.ts';
import type { MailDto } from '#shared/contract/mails.ts';
import { useSendAgain } from '../api/mail-queries.ts';

/** For administrators: puts a mail that arrived nowhere into the queue again. */
export function SendAgain({ mail, inList = false }: { mail: MailDto; inList?: boolean }) {
  const sendAgain = useSendAgain(mail.id);
  const notice = useNotice();
  return (
    <>
      <ProblemNote error={sendAgain.error} />
      <Button
        look={inList ? 'quiet' : 'plain'}
        className="whitespace-nowrap"
        aria-label={inList ? text.sendAgainOf(mail.subject) : undefined}
        busy={sendAgain.isPending}
        onClick={() => sendAgain.mutate(undefined, { onSuccess: () => notice(text.sendAgainDone) })}
      >
        {text.sendAgain}
      </Button>
    </>
  );
}

import { useSuspenseQuery } from '@tanstack/react-query';
import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { RadioField } from '#client/components/radio-field.tsx';
import { formatMoment } from '#client/lib/dates.ts';
import { mailChoiceText as text } from '#client/text/mail-choice.ts';
import { DIGEST_HOUR, type MailTiming, mailTiming } from '#shared/contract/mails.ts';
import { mailChoiceQuery, useChooseMail } from '../api/mail-choice.ts';

const HOUR = `${String(DIGEST_HOUR).padStart(2, '0')}:00`;
const hereZone = () => Intl.DateTimeFormat().resolvedOptions().timeZone;

/** How notices come by mail; each choice takes effect as it is made, by this computer's clock. */
export function MailChoiceForm() {
  const { data: choice } = useSuspenseQuery(mailChoiceQuery());
  const choose = useChooseMail();
  const notice = useNotice();
  const save = (timing: MailTiming) =>
    choose.mutate({ timing, timeZone: hereZone() }, { onSuccess: () => notice(text.saved) });
  // Shown as chosen from the press on, and taken back when the server refuses.
  const shown = choose.isPending ? choose.variables.timing : choice.timing;
  const zone = choice.timing === 'daily' ? choice.timeZone : hereZone();
  const hints: Record<MailTiming, string | undefined> = {
    atOnce: undefined,
    daily: text.dailyHint(HOUR, zone),
    off: text.offHint,
  };
  return (
    <div className="flex flex-col gap-3">
      <p className="m-0">{text.lead}</p>
      <ProblemNote error={choose.error} />
      <fieldset className="m-0 flex flex-col gap-2 border-0 p-0">
        <legend className="mb-1.5 p-0 text-sm font-semibold">{text.legend}</legend>
        {mailTiming.options.map((timing) => (
          <RadioField
            key={timing}
            name="mail-timing"
            label={text.timing(timing)}
            hint={hints[timing]}
            checked={shown === timing}
            onChange={() => save(timing)}
          />
        ))}
      </fieldset>
      {choice.nextDigestAt ? (
        <p className="m-0">{text.held(choice.held, formatMoment(choice.nextDigestAt))}</p>
      ) : null}
      {zone === hereZone() ? null : (
        <div>
          <Button look="quiet" busy={choose.isPending} onClick={() => save(choice.timing)}>
            {text.takeZone(hereZone())}
          </Button>
        </div>
      )}
      <p className="m-0 text-sm text-ink-2">{text.always}</p>
    </div>
  );
}

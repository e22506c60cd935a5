import { Link, useSearchParams } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { useStopDigest } from '#client/features/mails/api/mail-choice.ts';
import { PublicLayout } from '#client/layouts/public-layout.tsx';
import { paths } from '#client/lib/paths.ts';
import { mailChoiceText as text } from '#client/text/mail-choice.ts';

/** Where the link of a digest leads. One press stops it, without a sign-in; opening the page alone stops nothing. */
export function StopDigestPage() {
  const [search] = useSearchParams();
  const token = search.get('token') ?? '';
  const stop = useStopDigest(token);
  if (token === '') return <Told title={text.stopInvalidTitle} words={text.stopInvalid} />;
  if (stop.isSuccess) return <Told title={text.stopTitle} words={text.stopped} />;
  return (
    <PublicLayout title={text.stopTitle} lead={text.stopLead}>
      <div className="flex flex-col items-start gap-3">
        <ProblemNote error={stop.error} />
        <Button look="main" busy={stop.isPending} onClick={() => stop.mutate()}>
          {text.stop}
        </Button>
      </div>
    </PublicLayout>
  );
}

const Told = ({ title, words }: { title: string; words: string }) => (
  <PublicLayout title={title}>
    <p role="status" className="mt-0 mb-3">
      {words}
    </p>
    <Link to={paths.account}>{text.toAccount}</Link>
  </PublicLayout>
);

import { useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useLocation, useNavigate } from 'react-router-dom';
import { Button, ButtonLink } from '#client/components/button.tsx';
import { RequestNumber } from '#client/components/problem-note.tsx';
import { PublicLayout } from '#client/layouts/public-layout.tsx';
import { ApiProblem } from '#client/lib/api-problem.ts';
import { paths } from '#client/lib/paths.ts';
import { onSignInMoment } from '#client/lib/sign-in-state.ts';
import { problemText as text } from '#client/text/problems.ts';
import { NotFoundPage } from './not-found-page.tsx';

/** What a page shows in place of itself when it could not be loaded or failed: what happened, what to do, the request number. */
export function RouteError({ error }: { error: unknown }) {
  const retry = useRetry();
  useEffect(() => onSignInMoment((moment) => moment === 'signedIn' && retry()), [retry]);
  if (isNotFound(error)) return <NotFoundPage />;
  if (error instanceof ApiProblem && error.code === 'token-invalid')
    return <Failed title={text.linkInvalid} detail={error.message} error={error} retry={retry} />;
  if (error instanceof ApiProblem && error.code === 'figures-kept-back') return <KeptBack error={error} />;
  if (error instanceof ApiProblem)
    return <Failed title={error.problem.title} detail={error.message} error={error} retry={retry} />;
  if (isMissingScript(error))
    return <Failed title={text.unknownReplyTitle} detail={text.missingScript} error={error} />;
  return <Failed title={text.pageFailedTitle} detail={text.pageFailed} error={error} />;
}

/** The page's script could not be fetched: the server holds a newer client, or there is no connection. */
const isMissingScript = (error: unknown) =>
  error instanceof TypeError && /dynamically imported module|module script/i.test(error.message);

const isNotFound = (error: unknown) =>
  error instanceof ApiProblem
    ? error.code === 'not-found'
    : typeof error === 'object' && error !== null && 'status' in error && error.status === 404;

/** Forgets what failed and comes to the same address again, which takes the error away. */
function useRetry(): () => void {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const location = useLocation();
  return () => {
    queryClient.removeQueries({ predicate: (query) => query.state.status === 'error' });
    void navigate(location, { replace: true });
  };
}

/** The way on is the check, where the figures can be opened or points be read blind. */
function KeptBack({ error }: { error: ApiProblem }) {
  const revisionId = String(error.problem.extra?.revisionId ?? '');
  return (
    <PublicLayout title={error.problem.title}>
      <p className="mb-3">{error.message}</p>
      <div className="mt-4 flex flex-wrap gap-2">
        <ButtonLink look="main" to={paths.revision(revisionId)}>
          {text.openCheck}
        </ButtonLink>
        <ButtonLink to={paths.dams}>{text.toDams}</ButtonLink>
      </div>
    </PublicLayout>
  );
}

interface FailedProps {
  title: string;
  detail: string;
  error: unknown;
  retry?: () => void;
}

function Failed({ title, detail, error, retry }: FailedProps) {
  return (
    <PublicLayout title={title}>
      <p className="mb-3">{detail}</p>
      <RequestNumber error={error} />
      <div className="mt-4 flex flex-wrap gap-2">
        {retry ? (
          <Button look="main" onClick={retry}>
            {text.tryAgain}
          </Button>
        ) : (
          <Button look="main" onClick={() => window.location.reload()}>
            {text.reload}
          </Button>
        )}
        <ButtonLink to={paths.dams}>{text.toDams}</ButtonLink>
      </div>
    </PublicLayout>
  );
}

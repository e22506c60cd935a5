import type { ReactNode } from 'react';
import { ApiProblem } from '#client/lib/api-problem.ts';
import { problemText } from '#client/text/problems.ts';

/** What went wrong, what to do and the request number, announced when it appears. Renders nothing without an error. */
export function ProblemNote({ error, children }: { error: unknown; children?: ReactNode }) {
  if (!error) return null;
  const detail = error instanceof ApiProblem ? error.message : problemText.pageFailed;
  return (
    <div role="alert" className="border-l-[3px] border-wrong bg-film py-1 pl-3">
      <p className="m-0 text-wrong">{detail}</p>
      <FieldErrors error={error} />
      <RequestNumber error={error} />
      {children}
    </div>
  );
}

function FieldErrors({ error }: { error: unknown }) {
  const errors = error instanceof ApiProblem ? (error.problem.errors ?? []) : [];
  if (errors.length === 0) return null;
  return (
    <ul className="m-0 list-none p-0 text-sm">
      {errors.map((each) => (
        <li key={`${each.path} ${each.message}`}>{each.message}</li>
      ))}
    </ul>
  );
}

/** The number that finds this failure in the server's log. */
export function RequestNumber({ error }: { error: unknown }) {
  if (!(error instanceof ApiProblem) || error.problem.requestId === '') return null;
  return (
    <p className="m-0 text-sm break-all text-ink-2">
      {problemText.requestNumber} {error.problem.requestId}
    </p>
  );
}

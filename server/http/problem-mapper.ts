import type { ErrorRequestHandler, Request } from 'express';
import { AppError } from '#server/errors/app-error.ts';
import type { Problem } from '#shared/contract/problem.ts';

/** Errors that body parsers and the files' handler throw carry a status and are the asker's fault. */
function fromStatus(error: unknown): AppError | null {
  if (!(error instanceof Error) || !('status' in error) || typeof error.status !== 'number') return null;
  if (error.status === 413)
    return new AppError('too-large', 413, 'Too large', 'The request is larger than this address takes.');
  // A script of a build that is gone, asked for by a page from before it.
  if (error.status === 404)
    return new AppError(
      'not-found',
      404,
      'Not found',
      'There is nothing at this address. Load the page again.',
    );
  if (error.status >= 400 && error.status < 500)
    return new AppError('invalid-input', 400, 'Unreadable request', 'The request could not be read as JSON.');
  return null;
}

/** No room left: Node's ENOSPC for files, 53100 disk_full for PostgreSQL. */
function fromFullDisk(error: unknown): AppError | null {
  const code = error instanceof Error && 'code' in error ? error.code : undefined;
  if (code !== 'ENOSPC' && code !== '53100') return null;
  return new AppError(
    'disk-full',
    507,
    'The disk is full',
    'The server has no room left. Nothing was changed; tell the administrator and try again later.',
    { cause: error },
  );
}

/** Characters that PostgreSQL keeps in no text or JSON: U+0000 (22021, 22P05) and halves of a pair (22P02). */
const UNSTORABLE = ['22021', '22P05', '22P02'];

function fromUnstorableText(error: unknown): AppError | null {
  const code = error instanceof Error && 'code' in error ? String(error.code) : '';
  if (!UNSTORABLE.includes(code)) return null;
  return new AppError(
    'invalid-input',
    400,
    'Please correct the input',
    'A text contains a character that cannot be kept. Type it again instead of pasting it.',
    { cause: error },
  );
}

function fromUnknown(error: unknown): AppError {
  return new AppError(
    'internal',
    500,
    'Something went wrong',
    'The server could not do this. Try again; if it happens again, tell the administrator the request number.',
    { cause: error },
  );
}

export function toAppError(error: unknown): AppError {
  if (error instanceof AppError) return error;
  return fromStatus(error) ?? fromFullDisk(error) ?? fromUnstorableText(error) ?? fromUnknown(error);
}

function toProblem(error: AppError, req: Request): Problem {
  return {
    type: `urn:tracehead:problem:${error.code}`,
    title: error.title,
    status: error.status,
    detail: error.detail,
    instance: req.originalUrl,
    code: error.code,
    requestId: String(req.id),
    ...(error.errors ? { errors: error.errors } : {}),
    ...(error.extra ? { extra: error.extra } : {}),
  };
}

/** The one place where an error becomes a reply (RFC 9457). Log level error means that someone must act. */
export const problemMapper: ErrorRequestHandler = (thrown, req, res, next) => {
  const error = toAppError(thrown);
  if (error.status >= 500) req.log.error({ err: error.cause ?? error }, error.message);
  if (res.headersSent) {
    next(thrown);
    return;
  }
  res
    .status(error.status)
    .type('application/problem+json')
    .send(JSON.stringify(toProblem(error, req)));
};

import type { ProblemCode } from '#shared/contract/problem.ts';

export interface AppErrorOptions {
  errors?: Array<{ path: string; message: string }>;
  /** Facts a client may act on. */
  extra?: Record<string, unknown>;
  cause?: unknown;
}

/**
 * An error that the person at the other end may see: `detail` says what happened and what to do. Anything else
 * thrown becomes a bland 500 and is logged with its cause.
 */
export class AppError extends Error {
  readonly errors: Array<{ path: string; message: string }> | undefined;
  readonly extra: Record<string, unknown> | undefined;

  constructor(
    readonly code: ProblemCode,
    readonly status: number,
    readonly title: string,
    readonly detail: string,
    options: AppErrorOptions = {},
  ) {
    super(`${code}: ${detail}`, { cause: options.cause });
    this.errors = options.errors;
    this.extra = options.extra;
  }
}

export const notFound = (detail = 'This does not exist, or you do not belong to its dam.') =>
  new AppError('not-found', 404, 'Not found', detail);

export const notSignedIn = () =>
  new AppError(
    'not-signed-in',
    401,
    'Sign in first',
    'Your sign-in has ended. Sign in and try again; your work is kept.',
  );

export const forbidden = (
  detail = 'Your part on this dam does not allow this. Ask an engineer of the dam.',
) => new AppError('forbidden', 403, 'Not allowed', detail);

export const invalidInput = (errors: Array<{ path: string; message: string }>) =>
  new AppError(
    'invalid-input',
    400,
    'Please correct the input',
    errors.map((error) => (error.path ? `${error.path}: ${error.message}` : error.message)).join('; '),
    { errors },
  );

export const conflict = (code: ProblemCode, title: string, detail: string, extra?: Record<string, unknown>) =>
  new AppError(code, 409, title, detail, extra ? { extra } : {});

export const unprocessable = (code: ProblemCode, title: string, detail: string) =>
  new AppError(code, 422, title, detail);

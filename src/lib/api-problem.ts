import type { Problem, ProblemCode } from '#shared/contract/problem.ts';

/** What the server refused or could not do, or why it could not be reached. Pages switch on `code`. */
export class ApiProblem extends Error {
  readonly problem: Problem;

  constructor(problem: Problem, options?: ErrorOptions) {
    super(problem.detail, options);
    this.name = 'ApiProblem';
    this.problem = problem;
  }

  get code(): ProblemCode {
    return this.problem.code;
  }

  get status(): number {
    return this.problem.status;
  }

  /** True when no answer came at all: no connection, or the server is not running. */
  get isNoConnection(): boolean {
    return this.problem.status === 0;
  }
}

/** The message of one field of a refused form, or null. */
export function fieldMessage(error: unknown, path: string): string | null {
  if (!(error instanceof ApiProblem)) return null;
  const found = error.problem.errors?.find(
    (each) => each.path === path || each.path === `body.${path}` || each.path.endsWith(`.${path}`),
  );
  return found?.message ?? null;
}

/** A text member of the problem's `extra`, such as the id of the drawing that holds the same file. */
export function extraText(error: ApiProblem, name: string): string | null {
  const value = error.problem.extra?.[name];
  return typeof value === 'string' ? value : null;
}

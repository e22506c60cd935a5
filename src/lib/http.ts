import * as z from 'zod/mini';
import { problemText } from '#client/text/problems.ts';
import { sessionDto } from '#shared/contract/people.ts';
import { type Problem, problem as problemSchema } from '#shared/contract/problem.ts';
import { ApiProblem } from './api-problem.ts';
import { announce, currentCsrfToken, currentPersonId, rememberSession } from './sign-in-state.ts';

export const API_ROOT = '/api/v1';

type Schema = z.core.$ZodType;
type Method = 'POST' | 'PUT' | 'PATCH' | 'DELETE';
type Query = Record<string, string | number | undefined>;

interface CallOptions {
  query?: Query | undefined;
  /** Sent as JSON; a form with a file as it is. */
  body?: unknown;
  signal?: AbortSignal | undefined;
  /** Statuses besides 2xx whose body is the reply all the same, such as 409 of a batch of commands. */
  alsoAccept?: readonly number[];
  /** What nobody waits for and may fail: an ended session is not made known by it. */
  unasked?: boolean;
  /** Goes out even when the page is closed meanwhile. */
  keepalive?: boolean;
}

/** The address of an API path below /api/v1, with the query members that have a value. */
export function apiUrl(path: string, query: Query = {}): string {
  const parameters = new URLSearchParams();
  for (const [name, value] of Object.entries(query))
    if (value !== undefined) parameters.set(name, String(value));
  const search = parameters.toString();
  return `${API_ROOT}${path}${search === '' ? '' : `?${search}`}`;
}

/** Reads something; the reply is held against its schema. */
export async function getJson<S extends Schema>(
  path: string,
  reply: S,
  options: Pick<CallOptions, 'query' | 'signal' | 'unasked'> = {},
): Promise<z.output<S>> {
  return parseReply(await call('GET', path, options), reply);
}

/** Changes something and reads the reply. */
export async function sendJson<S extends Schema>(
  method: Method,
  path: string,
  reply: S,
  options: CallOptions = {},
): Promise<z.output<S>> {
  return parseReply(await call(method, path, options), reply);
}

/** Changes something that answers with nothing. */
export async function send(method: Method, path: string, options: CallOptions = {}): Promise<void> {
  await call(method, path, options);
}

async function call(method: 'GET' | Method, path: string, options: CallOptions): Promise<Response> {
  const response = await fetchOnce(method, path, options);
  if (isAccepted(response, options)) return response;
  const refused = await problemOf(response);
  if (refused.code === 'csrf' && (await renewToken())) {
    const second = await fetchOnce(method, path, options);
    if (isAccepted(second, options)) return second;
    throw announced(await problemOf(second), options);
  }
  throw announced(refused, options);
}

const isAccepted = (response: Response, options: CallOptions) =>
  response.ok || (options.alsoAccept?.includes(response.status) ?? false);

async function fetchOnce(
  method: string,
  path: string,
  { query, body, signal, keepalive = false }: CallOptions,
) {
  const headers: Record<string, string> = { Accept: 'application/json' };
  if (method !== 'GET') headers['X-CSRF-Token'] = currentCsrfToken();
  // A browser writes the type of a form itself, with the mark that parts its fields, and that of a file.
  const isPlain = body instanceof FormData || body instanceof Blob;
  if (body !== undefined && !isPlain) headers['Content-Type'] = 'application/json';
  const sent = body === undefined ? null : isPlain ? body : JSON.stringify(body);
  try {
    return await fetch(apiUrl(path, query), {
      method,
      headers,
      body: sent,
      keepalive,
      signal: signal ?? null,
    });
  } catch (cause) {
    if (signal?.aborted) throw cause;
    throw noConnection(cause);
  }
}

/**
 * Signing in again elsewhere in this browser renews the token. The write is repeated only when the session still
 * belongs to the same person: otherwise it would go out under another name.
 */
export async function renewToken(): Promise<boolean> {
  const before = currentPersonId();
  const response = await fetchOnce('GET', '/session', {});
  if (!response.ok) return false;
  const session = await parseReply(response, sessionDto);
  if (session.person?.id !== before && session.person !== null) return false;
  rememberSession(session);
  return true;
}

async function parseReply<S extends Schema>(response: Response, reply: S): Promise<z.output<S>> {
  const json: unknown = await response.json().catch(() => undefined);
  const parsed = z.safeParse(reply, json);
  if (parsed.success) return parsed.data;
  throw new ApiProblem(
    {
      ...madeHere(response.status, response.headers.get('X-Request-Id') ?? ''),
      title: problemText.unknownReplyTitle,
      detail: problemText.unknownReply,
    },
    { cause: parsed.error },
  );
}

async function problemOf(response: Response): Promise<ApiProblem> {
  const json: unknown = await response.json().catch(() => undefined);
  return problemFrom(json, response.status, response.headers.get('X-Request-Id') ?? '');
}

/** A problem from a body that may not be one: a proxy in between answers in its own words. */
export function problemFrom(body: unknown, status: number, requestId: string): ApiProblem {
  const parsed = z.safeParse(problemSchema, body);
  return new ApiProblem(parsed.success ? parsed.data : madeHere(status, requestId));
}

/** No answer at all. */
export function noConnection(cause?: unknown): ApiProblem {
  return new ApiProblem(
    {
      ...madeHere(0, ''),
      title: problemText.noConnectionTitle,
      detail: problemText.noConnection,
      code: 'unavailable',
    },
    { cause },
  );
}

function announced(refused: ApiProblem, { unasked = false }: CallOptions): ApiProblem {
  if (refused.code === 'not-signed-in' && !unasked) announce('signedOut');
  return refused;
}

const madeHere = (status: number, requestId: string): Problem => ({
  type: 'about:blank',
  title: problemText.pageFailedTitle,
  status,
  detail: problemText.unreadableReply,
  code: 'internal',
  requestId,
});

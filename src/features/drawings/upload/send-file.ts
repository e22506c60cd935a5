import { extraText } from '#client/lib/api-problem.ts';
import { apiUrl, noConnection, problemFrom, renewToken } from '#client/lib/http.ts';
import { announce, currentCsrfToken } from '#client/lib/sign-in-state.ts';

export interface SendInput {
  damId: string;
  file: File;
  /** Keep a second drawing of a file the dam already holds. */
  again: boolean;
  /** Share of the bytes sent, 0 to 1. */
  onProgress: (share: number) => void;
  signal: AbortSignal;
}

export type SendOutcome =
  | { outcome: 'added' }
  | { outcome: 'same'; drawingId: string; message: string }
  | { outcome: 'failed'; error: Error };

export type SendFile = (input: SendInput) => Promise<SendOutcome>;

/** Sends one file with XMLHttpRequest: fetch tells nothing of how much of a body has left. */
export const sendFile: SendFile = async (input) => {
  const first = await sendOnce(input);
  const isStale = first.status === 403 && problemOf(first).code === 'csrf';
  const answer = isStale && (await renewToken()) ? await sendOnce(input) : first;
  return outcomeOf(answer);
};

interface Answer {
  status: number;
  body: string;
  requestId: string;
}

function sendOnce({ damId, file, again, onProgress, signal }: SendInput): Promise<Answer> {
  return new Promise((resolve) => {
    const request = new XMLHttpRequest();
    const done = () =>
      resolve({
        status: request.status,
        body: request.responseText,
        requestId: request.getResponseHeader('X-Request-Id') ?? '',
      });
    request.open('POST', apiUrl(`/dams/${damId}/drawings`, { again: again ? 'yes' : undefined }));
    request.setRequestHeader('X-CSRF-Token', currentCsrfToken());
    request.upload.onprogress = (event) => onProgress(event.total > 0 ? event.loaded / event.total : 0);
    // Whatever ends it, the status tells how: 0 when no answer came.
    request.onloadend = done;
    signal.addEventListener('abort', () => request.abort(), { once: true });
    const form = new FormData();
    form.append('file', file, file.name);
    request.send(form);
  });
}

function problemOf(answer: Answer) {
  let body: unknown;
  try {
    body = JSON.parse(answer.body);
  } catch {
    // A proxy in between answered in its own words; the status says enough.
  }
  return problemFrom(body, answer.status, answer.requestId);
}

function outcomeOf(answer: Answer): SendOutcome {
  if (answer.status >= 200 && answer.status < 300) return { outcome: 'added' };
  if (answer.status === 0) return { outcome: 'failed', error: noConnection() };
  const problem = problemOf(answer);
  if (problem.code === 'not-signed-in') announce('signedOut');
  const drawingId = extraText(problem, 'drawingId');
  if (problem.code === 'already-uploaded' && drawingId)
    return { outcome: 'same', drawingId, message: problem.message };
  return { outcome: 'failed', error: problem };
}

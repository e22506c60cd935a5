import { ApiProblem } from '#client/lib/api-problem.ts';
import { sendJson } from '#client/lib/http.ts';
import { currentPersonId } from '#client/lib/sign-in-state.ts';
import { type CommandBatch, type CommandResult, commandResult } from '#shared/contract/nets.ts';
import type { Refusal, SendFailure } from './save-state.ts';

/** A connection that answers nothing for this long is taken for lost; the repeat is recognised by its number. */
const ANSWER_WITHIN_MS = 20_000;

/** What came of sending a batch. `refused`: the server will never take it. */
export type SendOutcome =
  | { kind: 'answered'; result: CommandResult }
  | { kind: 'failed'; failure: SendFailure; detail: string }
  | ({ kind: 'refused' } & Refusal);

export type SendBatch = (batch: CommandBatch) => Promise<SendOutcome>;

/** Sends batches of one net in the name of one person, and never in the name of whoever signed in since. */
export function batchSender(netId: string, personId: string): SendBatch {
  return async (batch) => {
    const signedIn = currentPersonId();
    if (signedIn !== personId) {
      return { kind: 'failed', failure: signedIn === null ? 'signedOut' : 'otherPerson', detail: '' };
    }
    try {
      const result = await sendJson('POST', `/nets/${netId}/commands`, commandResult, {
        body: batch,
        alsoAccept: [409],
        signal: AbortSignal.timeout(ANSWER_WITHIN_MS),
      });
      return { kind: 'answered', result };
    } catch (error) {
      return outcomeOf(error);
    }
  };
}

/** What a failed sending means for the batch. */
export function outcomeOf(error: unknown): SendOutcome {
  if (!(error instanceof ApiProblem)) return { kind: 'failed', failure: 'offline', detail: '' };
  const { detail, requestId } = error.problem;
  if (error.isNoConnection) return { kind: 'failed', failure: 'offline', detail };
  switch (error.code) {
    case 'not-signed-in':
      return { kind: 'failed', failure: 'signedOut', detail };
    case 'csrf':
      return { kind: 'failed', failure: 'otherPerson', detail };
    case 'forbidden':
    case 'not-found':
      return { kind: 'failed', failure: 'forbidden', detail };
    case 'invalid-input':
    case 'too-large':
      return { kind: 'refused', reason: detail, requestId };
    default:
      return { kind: 'failed', failure: 'server', detail };
  }
}

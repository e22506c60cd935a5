import { describe, expect, it } from 'vitest';
import { outcomeOf } from '#client/features/desk/saving/send-commands.ts';
import { noConnection, problemFrom } from '#client/lib/http.ts';
import { savingText } from '#client/text/saving.ts';

const problem = (code: string, status: number) =>
  problemFrom(
    {
      type: 'about:blank',
      title: 'Not accepted',
      status,
      detail: 'A line has at most 5000 points.',
      code,
      requestId: '01HX-7',
    },
    status,
    'unused',
  );

describe('a batch that the server did not take', () => {
  it('is refused with the reason and the request number when it never will be', () => {
    for (const refused of [problem('invalid-input', 422), problem('too-large', 413)]) {
      expect(outcomeOf(refused)).toEqual({
        kind: 'refused',
        reason: 'A line has at most 5000 points.',
        requestId: '01HX-7',
      });
    }
  });

  it('waits when the person or the connection has to change first', () => {
    expect(outcomeOf(problem('not-signed-in', 401))).toMatchObject({ kind: 'failed', failure: 'signedOut' });
    expect(outcomeOf(problem('forbidden', 403))).toMatchObject({ kind: 'failed', failure: 'forbidden' });
    expect(outcomeOf(problem('internal', 500))).toMatchObject({ kind: 'failed', failure: 'server' });
    expect(outcomeOf(noConnection())).toMatchObject({ kind: 'failed', failure: 'offline' });
  });
});

describe('the line about a refused change', () => {
  it('ends with the request number, where there is one', () => {
    expect(savingText.refused('drew a line', 'Too many points.', '01HX-7')).toBe(
      'Not accepted: drew a line. Too many points. Request number 01HX-7',
    );
    expect(savingText.refused('drew a line', 'Too many points.', '')).toBe(
      'Not accepted: drew a line. Too many points.',
    );
  });
});

import { describe, expect, it } from 'vitest';
import { mailOnWriting, mayWait } from '#server/policies/mail-policy.ts';
import { mailKind, mailTiming } from '#shared/contract/mails.ts';

describe('a mail', () => {
  it('waits for a digest only where nobody waits for its reader', () => {
    expect(mailKind.options.filter(mayWait).sort()).toEqual([
      'accepted',
      'acceptedWithNotes',
      'addedToDam',
      'namedInNote',
    ]);
  });

  it('that may not wait goes at once whatever the reader has chosen', () => {
    for (const kind of mailKind.options.filter((each) => !mayWait(each)))
      for (const timing of mailTiming.options) expect(mailOnWriting(kind, timing), kind).toBe('waiting');
  });

  it('that may wait follows the choice', () => {
    expect(mailTiming.options.map((timing) => [timing, mailOnWriting('namedInNote', timing)])).toEqual([
      ['atOnce', 'waiting'],
      ['daily', 'held'],
      ['off', 'dropped'],
    ]);
  });
});

import { describe, expect, it } from 'vitest';
import {
  announce,
  currentCsrfToken,
  currentPersonId,
  onSignInMoment,
  rememberSession,
} from '#client/lib/sign-in-state.ts';

describe('what the browser knows of its session', () => {
  it('renews the token and still knows whose page it is when the session has ended', () => {
    rememberSession({ csrfToken: 'one', person: { id: 'iris' } });
    rememberSession({ csrfToken: 'two', person: null });
    expect([currentCsrfToken(), currentPersonId()]).toEqual(['two', 'iris']);
    rememberSession({ csrfToken: 'three', person: { id: 'remi' } });
    expect(currentPersonId()).toBe('remi');
  });

  it('tells each listener of each moment until it stops listening', () => {
    const heard: string[] = [];
    const stop = onSignInMoment((moment) => {
      heard.push(moment);
    });
    announce('signedOut');
    announce('signedIn');
    stop();
    announce('signedOut');
    expect(heard).toEqual(['signedOut', 'signedIn']);
  });
});

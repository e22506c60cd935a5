import { describe, expect, it } from 'vitest';
import {
  digestStopPage,
  digestStopToken,
  digestStopUrl,
  personOfStopToken,
} from '#server/services/digest-link.ts';

const config = { publicUrl: 'https://tracehead.test', sessionSecret: 'a secret of the installation' };
const person = '019a3c00-0000-7000-8000-000000000001';
const other = '019a3c00-0000-7000-8000-000000000002';

describe('the link that stops digests', () => {
  it('names whose digests it stops', () => {
    const token = new URL(digestStopUrl(config, person)).searchParams.get('token') ?? '';
    expect(personOfStopToken(config, token)).toBe(person);
    expect(new URL(digestStopPage(config, token)).searchParams.get('token')).toBe(token);
  });

  it('is refused when it is of another person, of another installation or cut short', () => {
    const [, signature = ''] = digestStopToken(config, person).split('.');
    const elsewhere = { ...config, sessionSecret: 'another secret' };
    for (const token of [
      `${other}.${signature}`,
      `${person}.${signature.slice(0, -2)}`,
      digestStopToken(elsewhere, person),
      person,
      '',
      '.',
    ])
      expect(() => personOfStopToken(config, token), token).toThrow(/token-invalid/);
  });
});

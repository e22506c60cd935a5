import type { Letter } from '#server/mail/templates/letter.ts';

/** A letter as a template makes it, of a kind that never waits unless another is named. */
export const testLetter = (parts: Partial<Letter> = {}): Letter => ({
  kind: 'sentForChecking',
  subject: 'For checking',
  text: 'Please check revision A.',
  html: '<p>Please check.</p>',
  brief: 'Please check revision A.',
  link: 'http://tracehead.test/revisions/1',
  ...parts,
});

import { describe, expect, it } from 'vitest';
import {
  decidedMail,
  type RevisionFacts,
  sentForCheckingMail,
} from '#server/mail/templates/checking-mails.ts';
import { addedToDamMail, invitationMail, passwordResetMail } from '#server/mail/templates/people-mails.ts';

const REVISION: RevisionFacts = {
  damName: 'Harrow Fen Dam',
  drawing: 'HF-114 rev. C',
  section: 'Section B–B at 212',
  netName: 'as drawn, full supply level',
  revision: 'A',
};
const LINK = 'http://tracehead.test/revisions/1';

const letters = {
  invitation: invitationMail({
    invitedBy: 'Iris Marsh',
    damName: 'Harrow Fen Dam',
    parts: 'reviewer',
    url: LINK,
    daysValid: 7,
  }),
  bareInvitation: invitationMail({ invitedBy: 'Ada', damName: null, parts: '', url: LINK, daysValid: 7 }),
  added: addedToDamMail({ addedBy: 'Iris Marsh', damName: 'Harrow Fen Dam', parts: 'engineer', url: LINK }),
  reset: passwordResetMail({ url: LINK, minutesValid: 60 }),
  sent: sentForCheckingMail({
    ...REVISION,
    sentBy: 'Iris Marsh',
    message: 'Piezometer P3 is new.',
    figures: {
      heads: ['Point', 'Elevation, m', 'Pore pressure, kPa'],
      rows: [
        ['P1', '96.20', '112.4'],
        ['P12', '101.05', '8.9'],
      ],
    },
    hash: 'a1b2c3',
    dueOn: '2026-12-05',
    changes: ['2 lines changed.'],
    url: LINK,
  }),
  accepted: decidedMail({
    ...REVISION,
    decision: 'accepted',
    decidedBy: 'Remi Okafor',
    capacity: 'Reviewing engineer',
    note: '',
    url: LINK,
  }),
  returned: decidedMail({
    ...REVISION,
    decision: 'returned',
    decidedBy: 'Remi Okafor',
    capacity: 'Reviewing engineer',
    note: 'Line 4 crosses the drain.',
    url: LINK,
  }),
};

describe('every mail', () => {
  it.each(Object.entries(letters))('(%s) has one link and fetches nothing', (_name, { html, text }) => {
    expect(html.match(/https?:/g)).toHaveLength(1);
    expect(text.match(/https?:/g)).toHaveLength(1);
    expect(html).not.toMatch(/<(img|script|link|iframe|style)|src=|url\(/i);
    expect(text).not.toMatch(/[<>]|&\w+;/);
  });

  it.each(Object.entries(letters))('(%s) has a subject of one line', (_name, { subject }) => {
    expect(subject).toMatch(/^\S.{5,200}\S$/);
    expect(subject).not.toMatch(/[\r\n]/);
  });
});

describe('the mail to the reviewer', () => {
  it('names dam, drawing, section and revision in its subject', () => {
    expect(letters.sent.subject).toBe(
      'For checking: Harrow Fen Dam, HF-114 rev. C, Section B–B at 212, revision A',
    );
  });

  it('sets the figures in columns in the plain text', () => {
    expect(letters.sent.text).toContain(
      'Point  Elevation, m  Pore pressure, kPa\nP1            96.20               112.4\nP12          101.05                 8.9',
    );
  });

  it('says so when the net is returned, with the note', () => {
    expect(letters.returned.subject).toMatch(/^Returned: /);
    expect(letters.returned.text).toContain('Note: Line 4 crosses the drain.');
    expect(letters.accepted.subject).toMatch(/^Accepted: /);
    expect(letters.accepted.text).not.toContain('Note:');
  });
});

describe('what people type', () => {
  it('stays text in the HTML and cannot add a line to the subject', () => {
    const nasty = '<img src=x onerror="alert(1)">&\'';
    const { html, subject } = sentForCheckingMail({
      ...REVISION,
      damName: `Fen\r\nBcc: everyone@elsewhere.example ${nasty}`,
      sentBy: nasty,
      message: `${nasty}\nsecond line`,
      figures: { heads: [nasty], rows: [[nasty]] },
      hash: 'a1b2c3',
      dueOn: '2026-12-05',
      changes: ['2 lines changed.'],
      url: LINK,
    });
    expect(html).not.toContain('<img');
    expect(html).toContain('&lt;img src=x onerror=&quot;alert(1)&quot;&gt;&amp;&#39;<br>second line');
    expect(subject).not.toMatch(/[\r\n]/);
  });
});

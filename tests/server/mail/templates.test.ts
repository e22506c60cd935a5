import { describe, expect, it } from 'vitest';
import {
  decidedMail,
  type RevisionFacts,
  sentForCheckingMail,
} from '#server/mail/templates/checking-mails.ts';
import { digestMail } from '#server/mail/templates/digest-mail.ts';
import { withPicture } from '#server/mail/templates/letter.ts';
import { namedInNoteMail } from '#server/mail/templates/note-mails.ts';
import { addedToDamMail, invitationMail, passwordResetMail } from '#server/mail/templates/people-mails.ts';
import { sampleLetters } from '#server/mail/templates/sample-letters.ts';
import { mailKind } from '#shared/contract/mails.ts';

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

describe('the samples', () => {
  const samples = sampleLetters('https://tracehead.test');

  it('show every kind of mail once', () => {
    expect(samples.map(({ kind }) => kind).sort()).toEqual([...mailKind.options].sort());
  });

  it.each(samples.map((letter) => [letter.kind, letter] as const))(
    '(%s) stay within the width of a plain client',
    (_kind, { text }) => {
      const figures = text.split('\n').filter((line) => / {2}/.test(line));
      for (const line of figures) expect(line.length, line).toBeLessThanOrEqual(76);
    },
  );
});

describe('a picture in a mail', () => {
  const picture = { source: 'cid:section@tracehead.test', alt: 'Section "B–B" & net', widthPx: 600 };

  it('stands in its place, named for readers who do not see it', () => {
    const html = withPicture(letters.sent.html, picture);
    expect(html).toContain('<img src="cid:section@tracehead.test" alt="Section &quot;B–B&quot; &amp; net"');
    expect(html.indexOf('<img')).toBeLessThan(html.indexOf('Point'));
  });

  it('leaves no trace when there is none', () => {
    expect(withPicture(letters.sent.html, null)).not.toMatch(/picture|<img|<!--/);
    expect(withPicture(letters.accepted.html, picture)).not.toContain('<img');
  });

  it('is not put into what somebody typed', () => {
    const { html } = namedInNoteMail({
      ...REVISION,
      author: 'A',
      noteNumber: 1,
      text: '<!--picture-->',
      url: LINK,
    });
    expect(withPicture(html, picture)).not.toContain('<img');
  });
});

describe('the daily digest', () => {
  const item = (n: number) => ({
    title: `Note ${n} names you`,
    text: `<b>Why ${n}?</b>`,
    url: `${LINK}${n}`,
  });
  const digest = digestMail({ day: '2 December 2026', items: [item(1), item(2)], stopUrl: `${LINK}#stop` });

  it('says how many notices it holds, in one line', () => {
    expect(digest.subject).toBe('Daily digest of 2 December 2026: 2 notices');
  });

  it('tells each with its link, in both parts, and fetches nothing', () => {
    for (const n of [1, 2]) {
      expect(digest.text).toContain(`${n}. Note ${n} names you\n<b>Why ${n}?</b>\n${LINK}${n}`);
      expect(digest.html).toContain(
        `<a href="${LINK}${n}">Note ${n} names you</a><br>&lt;b&gt;Why ${n}?&lt;/b&gt;`,
      );
    }
    expect(digest.text).toContain(`Stop these digests:\n${LINK}#stop`);
    expect(digest.html).not.toMatch(/<(img|script|iframe|style)|src=/i);
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

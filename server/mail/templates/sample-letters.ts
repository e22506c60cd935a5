import {
  type DecidedData,
  decidedMail,
  type RevisionFacts,
  reviewReminderMail,
  sendingWithdrawnMail,
  sentForCheckingMail,
} from './checking-mails.ts';
import { digestMail } from './digest-mail.ts';
import type { Figures, Letter, LetterPicture } from './letter.ts';
import { namedInNoteMail } from './note-mails.ts';
import { addedToDamMail, invitationMail, passwordResetMail } from './people-mails.ts';

/** An invented dam and its people; the figures are no reading of anything. */
const REVISION: RevisionFacts = {
  damName: 'Sample Dam',
  drawing: 'SD-12 rev C',
  section: 'Section B–B, chainage 212',
  netName: 'Full supply level',
  revision: 'B',
};
const FIGURES: Figures = {
  heads: ['Point', 'Elevation, m', 'Drops lost', 'Total head, m, ± at 95 %', 'Pore pressure, kPa, ± at 95 %'],
  rows: [
    ['P1', '96.20', '2.4', '107.6 ± 0.2', '111.8 ± 1.9'],
    ['P2', '94.05', '5.1', '104.9 ± 0.2', '106.4 ± 2.1'],
    ['P3', '98.70', '7.8', '102.2 ± 0.3', '34.3 ± 2.6'],
  ],
};
const HASH = '5e'.repeat(32);

/** What the picture of a section looks like in the preview, as an address that holds it. */
export const SAMPLE_PICTURE: LetterPicture = {
  source: `data:image/svg+xml,${encodeURIComponent(sampleSection())}`,
  alt: 'Section B–B as frozen with revision B: a sample of the traced net.',
  widthPx: 600,
};

function sampleSection(): string {
  const heads = [150, 220, 300, 380, 450].map(
    (x) => `M${x} 60Q${x + (x - 300) / 6} 150 ${300 + (x - 300) * 1.6} 240`,
  );
  const flows = [110, 160].map((y) => `M60 60Q300 ${2 * y} 540 60`);
  const path = (d: string, colour: string, dash = '') =>
    `<path d="${d}" fill="none" stroke="${colour}" stroke-width="1.5" stroke-dasharray="${dash}"/>`;
  return [
    '<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 600 280"><rect width="600" height="280" fill="#fafcfb"/>',
    path('M20 60H200V80H400V60H580', '#5b5346'),
    ...heads.map((d) => path(d, '#0f6b66')),
    ...flows.map((d) => path(d, '#a8472b', '14 3')),
    '<circle cx="260" cy="140" r="4" fill="#fff" stroke="#6d2a78" stroke-width="2"/></svg>',
  ].join('');
}

/** One letter of each kind and, of those that differ, of each decision, in the order in which a net goes through them. */
export function sampleLetters(publicUrl: string): Letter[] {
  const url = `${publicUrl}/revisions/sample`;
  const decided = (decision: DecidedData['decision'], note: string) =>
    decidedMail({
      ...REVISION,
      decision,
      decidedBy: 'Robin Vale',
      capacity: 'Reviewing engineer',
      note,
      url,
    });
  const named = namedInNoteMail({
    ...REVISION,
    author: 'Kim Alder',
    noteNumber: 4,
    text: '@Sam Reed was the drain open when these levels were read?',
    url: `${publicUrl}/nets/sample`,
  });
  const accepted = decided('accepted', '');
  return [
    sentForCheckingMail({
      ...REVISION,
      sentBy: 'Sam Reed',
      message: 'Line 4 follows the drain as found in 1998.',
      dueOn: '2030-03-15',
      changes: ['2 lines moved, 1 drawn.', 'P2: pore pressure 109.0 to 106.4 kPa.'],
      figures: FIGURES,
      hash: HASH,
      url,
    }),
    ...(['dayBefore', 'overdue'] as const).map((kind) =>
      reviewReminderMail({ ...REVISION, kind, dueOn: '2030-03-15', sentBy: 'Sam Reed', url }),
    ),
    sendingWithdrawnMail({
      ...REVISION,
      withdrawnBy: 'Sam Reed',
      reason: 'The tailwater was read anew.',
      url,
    }),
    accepted,
    decided('acceptedWithNotes', 'State the year of the survey on the sheet.'),
    decided('returned', 'Line 4 crosses the drain.'),
    decided('acceptanceWithdrawn', 'The headwater was that of another day.'),
    named,
    digestMail({
      day: '15 March 2030',
      items: [named, accepted].map(({ subject, brief, link }) => ({
        title: subject,
        text: brief,
        url: link,
      })),
      stopUrl: `${publicUrl}/stop-digest?token=sample`,
    }),
    addedToDamMail({
      addedBy: 'Sam Reed',
      damName: REVISION.damName,
      parts: 'reviewer',
      url: `${publicUrl}/dams/sample`,
    }),
    invitationMail({
      invitedBy: 'Sam Reed',
      damName: REVISION.damName,
      parts: 'engineer and reviewer',
      url: `${publicUrl}/invitation#sample`,
      daysValid: 7,
    }),
    passwordResetMail({ url: `${publicUrl}/reset-password#sample`, minutesValid: 60 }),
  ];
}

import type { DecisionKind } from '#shared/contract/revisions.ts';
import { type Figures, type Letter, layOut } from './letter.ts';

/** What a revision is of, in finished words. */
export interface RevisionFacts {
  damName: string;
  /** Drawing number, with its revision where it has one. */
  drawing: string;
  /** Section with its chainage where it has one. */
  section: string;
  netName: string;
  /** The net's own revision letter. */
  revision: string;
}

const factsOf = (facts: RevisionFacts): Array<[string, string]> => [
  ['Dam', facts.damName],
  ['Drawing', facts.drawing],
  ['Section', facts.section],
  ['Flow net', facts.netName],
  ['Revision', facts.revision],
];

const title = (facts: RevisionFacts) =>
  `${facts.damName}, ${facts.drawing}, ${facts.section}, revision ${facts.revision}`;

export interface SentForCheckingData extends RevisionFacts {
  sentBy: string;
  message: string;
  /** The day by which the check is wanted, YYYY-MM-DD; null where none was named. */
  dueOn: string | null;
  /** What changed since the revision before, in sentences; null for the first. */
  changes: string[] | null;
  /** The schedule's main figures as frozen, already formatted. */
  figures: Figures | null;
  /** SHA-256 of the frozen record: kept in a mailbox, it is a copy that nobody can rewrite together with the database. */
  hash: string;
  url: string;
}

export function sentForCheckingMail(data: SentForCheckingData): Letter {
  return layOut({
    kind: 'sentForChecking',
    hasPicture: true,
    subject: `For checking: ${title(data)}`,
    paragraphs: [
      `${data.sentBy} asks you to check a flow net.`,
      ...(data.message ? [`Message: ${data.message}`] : []),
      ...(data.changes ? [`Since the revision before:\n${data.changes.join('\n')}`] : []),
    ],
    facts: [
      ...factsOf(data),
      ...(data.dueOn ? [['Wanted by', dayText(data.dueOn)] as [string, string]] : []),
      ['Hash of the record', data.hash],
    ],
    figures: data.figures,
    link: { label: 'Open the revision', url: data.url },
    closing: [
      'A flow net is a two-dimensional estimate of steady seepage.',
      ...(data.figures ? ['The figures above are those frozen with the revision.'] : []),
    ].join(' '),
  });
}

export interface DecidedData extends RevisionFacts {
  decision: Exclude<DecisionKind, 'sendingWithdrawn'>;
  decidedBy: string;
  /** In what capacity the decision was signed. */
  capacity: string;
  note: string;
  url: string;
}

const DECIDED: Record<DecidedData['decision'], { subject: string; did: string; closing: string }> = {
  accepted: {
    subject: 'Accepted',
    did: 'has checked and accepted the flow net.',
    closing: 'The revision stays as it is. A later change of the net needs a new revision.',
  },
  acceptedWithNotes: {
    subject: 'Accepted with notes',
    did: 'has checked the flow net and accepted it with notes.',
    closing: 'The revision stays as it is. A later change of the net needs a new revision.',
  },
  returned: {
    subject: 'Returned',
    did: 'has returned the flow net.',
    closing: 'The revision stays as it is. Change the net and send it again as a new revision.',
  },
  acceptanceWithdrawn: {
    subject: 'Acceptance withdrawn',
    did: 'has withdrawn the acceptance of the flow net. Do not use its figures.',
    closing: 'The revision and its acceptance stay to be read. Send the net again as a new revision.',
  },
};

export function decidedMail(data: DecidedData): Letter {
  const { subject, did, closing } = DECIDED[data.decision];
  return layOut({
    kind: data.decision,
    subject: `${subject}: ${title(data)}`,
    paragraphs: [`${data.decidedBy} ${did}`, ...(data.note ? [`Note: ${data.note}`] : [])],
    facts: [...factsOf(data), ['Signed', `${data.decidedBy}, ${data.capacity}`]],
    link: { label: 'Open the revision', url: data.url },
    closing,
  });
}

export interface SendingWithdrawnData extends RevisionFacts {
  withdrawnBy: string;
  reason: string;
  url: string;
}

export function sendingWithdrawnMail(data: SendingWithdrawnData): Letter {
  return layOut({
    kind: 'sendingWithdrawn',
    subject: `Withdrawn from checking: ${title(data)}`,
    paragraphs: [
      `${data.withdrawnBy} has withdrawn the flow net from checking. Nothing more is asked of you.`,
      `Reason: ${data.reason}`,
    ],
    facts: factsOf(data),
    link: { label: 'Open the revision', url: data.url },
    closing: 'The revision stays as it is. When the net is sent again, it comes as a new revision.',
  });
}

export interface ReviewReminderData extends RevisionFacts {
  kind: 'dayBefore' | 'overdue';
  /** YYYY-MM-DD. */
  dueOn: string;
  sentBy: string;
  url: string;
}

export function reviewReminderMail(data: ReviewReminderData): Letter {
  const overdue = data.kind === 'overdue';
  return layOut({
    kind: overdue ? 'overdue' : 'dueTomorrow',
    subject: `${overdue ? 'Overdue for checking' : 'Due tomorrow for checking'}: ${title(data)}`,
    paragraphs: [
      overdue
        ? `The check that ${data.sentBy} asked of you was due on ${dayText(data.dueOn)}.`
        : `The check that ${data.sentBy} asked of you is due on ${dayText(data.dueOn)}.`,
    ],
    facts: factsOf(data),
    link: { label: 'Open the revision', url: data.url },
    closing: 'You get this once. It ends with your decision, or when the revision is withdrawn.',
  });
}

const DAY = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'long',
  year: 'numeric',
  timeZone: 'UTC',
});
const dayText = (isoDay: string) => DAY.format(new Date(isoDay));

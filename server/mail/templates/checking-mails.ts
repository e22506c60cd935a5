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
  /** The schedule's main figures as frozen, already formatted. */
  figures: Figures | null;
  /** SHA-256 of the frozen record: kept in a mailbox, it is a copy that nobody can rewrite together with the database. */
  hash: string;
  url: string;
}

export function sentForCheckingMail(data: SentForCheckingData): Letter {
  return layOut({
    subject: `For checking: ${title(data)}`,
    paragraphs: [
      `${data.sentBy} asks you to check a flow net.`,
      ...(data.message ? [`Message: ${data.message}`] : []),
    ],
    facts: [...factsOf(data), ['Hash of the record', data.hash]],
    figures: data.figures,
    link: { label: 'Open the revision', url: data.url },
    closing:
      'A flow net is a two-dimensional estimate of steady seepage. The figures above are those frozen with the revision.',
  });
}

export interface DecidedData extends RevisionFacts {
  decision: 'accepted' | 'returned';
  decidedBy: string;
  note: string;
  url: string;
}

export function decidedMail(data: DecidedData): Letter {
  const accepted = data.decision === 'accepted';
  return layOut({
    subject: `${accepted ? 'Accepted' : 'Returned'}: ${title(data)}`,
    paragraphs: [
      accepted
        ? `${data.decidedBy} has checked and accepted the flow net.`
        : `${data.decidedBy} has returned the flow net.`,
      ...(data.note ? [`Note: ${data.note}`] : []),
    ],
    facts: factsOf(data),
    link: { label: 'Open the revision', url: data.url },
    closing: accepted
      ? 'The revision stays as it is. A later change of the net needs a new revision.'
      : 'The revision stays as it is. Change the net and send it again as a new revision.',
  });
}

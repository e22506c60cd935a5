import { type Letter, type LetterItem, layOut } from './letter.ts';

export interface DigestData {
  /** The reader's day, in words. */
  day: string;
  /** In the order in which they were written. */
  items: LetterItem[];
  /** Stops the digests without a sign-in. */
  stopUrl: string;
}

/** What was held for a person since the last digest. */
export function digestMail({ day, items, stopUrl }: DigestData): Letter {
  const count = `${items.length} ${items.length === 1 ? 'notice' : 'notices'}`;
  return layOut({
    kind: 'digest',
    subject: `Daily digest of ${day}: ${count}`,
    paragraphs: [`${count} since your last digest.`],
    items,
    link: { label: 'Stop these digests', url: stopUrl },
    closing:
      'You chose to get notices together once a day. What asks something of you, such as a net to check, still comes at once.',
  });
}

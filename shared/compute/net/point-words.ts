import type { HeadOfLine } from '#shared/compute/net/net-heads.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import type { FieldAt, HandAt } from '#shared/compute/net/two-readings.ts';
import { fixedText } from '#shared/text/number-text.ts';

/** A reading in words: the count by hand's rule, which can be followed on paper, and the figure by the field. */
export function explainReading(
  before: HeadOfLine,
  after: HeadOfLine,
  hand: HandAt,
  field: FieldAt | null,
  ground: ReadingGround,
): string {
  const { levelUnit, unequal } = ground;
  const byHand = unequal
    ? handByHeads(before, after, hand, ground)
    : handByDrops(before, after, hand, ground);
  if (field === null) return `${byHand} The field could not be solved there: the figure is the hand rule's.`;
  const figure = unequal ? '' : `${fixedText(field.dropsLost, 2)} drops lost, `;
  return `${byHand} By the field between the two lines, which is the figure: ${figure}total head ${fixedText(field.totalHead, 2)} ${levelUnit}.`;
}

/** On a face of free outflow the count says nothing. */
export function explainFreeFace(elevation: number, { levelUnit }: ReadingGround): string {
  return `On the face of free outflow the total head is the elevation, ${fixedText(elevation, 2)} ${levelUnit}.`;
}

function handByHeads(
  before: HeadOfLine,
  after: HeadOfLine,
  hand: HandAt,
  { levelUnit }: ReadingGround,
): string {
  return `From ${before.label} (head ${fixedText(hand.headBefore, 2)}) ${fixedText(hand.way.fraction, 2)} of the way to ${after.label} (head ${fixedText(hand.headAfter, 2)}): total head ${fixedText(hand.totalHead, 2)} ${levelUnit}.`;
}

function handByDrops(
  before: HeadOfLine,
  after: HeadOfLine,
  hand: HandAt,
  { levelUnit }: ReadingGround,
): string {
  const drops = Math.round(before.drops * 100) / 100;
  const lead =
    before.drops === 0
      ? `No drop lost at ${before.label}, then`
      : `${drops} ${drops === 1 ? 'drop' : 'drops'} lost at ${before.label}, then`;
  const span = after.drops - before.drops;
  const of = Math.abs(span - 1) < 0.005 ? 'the drop' : `the ${Math.round(span * 100) / 100} drops`;
  return `${lead} ${fixedText(hand.way.fraction, 2)} of ${of} from ${before.label} to ${after.label}: ${fixedText(hand.dropsLost, 2)} drops lost, total head ${fixedText(hand.totalHead, 2)} ${levelUnit}.`;
}

import { enteredText, fixedText } from '#client/lib/figures.ts';
import { lineText } from '#client/text/desk-forms.ts';
import { measuredText } from '#client/text/measured.ts';
import { savingText as text } from '#client/text/saving.ts';
import type { DocumentEntity, EntityOf } from '#shared/contract/document.ts';

export interface ConflictFact {
  name: string;
  mine: string;
  theirs: string;
}

/** What differs between two versions of one thing, member by member, in words. */
export function conflictFacts(mine: DocumentEntity | null, theirs: DocumentEntity | null): ConflictFact[] {
  if (!mine || !theirs) {
    const name = text.things[(mine ?? theirs)?.kind ?? 'line'];
    return [{ name, mine: mine ? name : text.removed, theirs: theirs ? name : text.removed }];
  }
  const [left, right] = [wordsOf(mine), wordsOf(theirs)];
  return Object.keys({ ...left, ...right })
    .map((name) => ({ name, mine: left[name] ?? '–', theirs: right[name] ?? '–' }))
    .filter((fact) => fact.mine !== fact.theirs);
}

type Words = Record<string, string>;
const figure = (value: number | null) => (value === null ? '–' : enteredText(value));
const place = ([x, y]: readonly [number, number]) => `${fixedText(x, 1)}, ${fixedText(y, 1)} px`;

function wordsOf(value: DocumentEntity): Words {
  switch (value.kind) {
    case 'line':
      return {
        [text.facts.kind]: lineText.kinds[value.line],
        [text.facts.name]: value.name,
        [text.facts.points]: text.facts.pointsOf(value.points.length, value.points.map(place).join('; ')),
        [text.facts.finished]: value.finished ? text.facts.yes : text.facts.no,
        [text.facts.water]: value.water ? lineText.waters[value.water] : '–',
        [text.facts.head]: figure(value.head),
        [text.facts.drops]: figure(value.drops),
        [text.facts.origin]: value.origin,
      };
    case 'readingPoint':
      return {
        [text.facts.name]: value.name,
        [text.facts.place]: placeWords(value.place),
        [text.facts.measured]: measuredWords(value.measured),
        [text.facts.tip]: figure(value.elevationPlusMinus),
      };
    case 'soil':
      return { ...memberWords(value), [text.facts.places]: value.places.map(place).join('; ') || '–' };
    case 'profile':
      return { ...memberWords(value), [text.facts.places]: profileWords(value.place) };
    case 'knownPoint':
      return {
        [text.facts.name]: value.name,
        [text.facts.place]: place(value.at),
        [text.facts.offset]: figure(value.offset),
        [text.facts.elevation]: figure(value.elevation),
        [text.facts.use]: value.use,
      };
    default:
      return memberWords(value);
  }
}

function placeWords(at: Extract<DocumentEntity, { kind: 'readingPoint' }>['place']): string {
  return at.on === 'sheet' ? place(at.at) : text.facts.typedPlace(at.offset, at.elevation);
}

function measuredWords(measured: EntityOf<'readingPoint'>['measured']): string {
  if (measured === null) return '–';
  const { value, as, plusMinus, on } = measured;
  const figures =
    plusMinus === null ? enteredText(value) : `${enteredText(value)} ± ${enteredText(plusMinus)}`;
  return [measuredText.kinds[as], figures, on].filter(Boolean).join(', ');
}

function profileWords(at: EntityOf<'profile'>['place']): string {
  if (at.on === 'sheet') return at.points.map(place).join('; ');
  return (at.on === 'grid' ? at.corners : at.points).map(([x, z]) => text.facts.typedPlace(x, z)).join('; ');
}

/** Levels, permeability, count and set-out: their members are the figures themselves. */
function memberWords(value: DocumentEntity): Words {
  const names = text.members as Readonly<Record<string, string>>;
  return Object.fromEntries(
    Object.entries(value)
      .filter(([member]) => member in names)
      .map(([member, held]) => [
        names[member] ?? member,
        typeof held === 'number' || held === null ? figure(held) : String(held),
      ]),
  );
}

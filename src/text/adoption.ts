import type { AdoptableKind } from '#shared/compute/beside/adopted-lines.ts';
import { inLanguage } from './language.ts';

const KINDS: Record<AdoptableKind, readonly [one: string, many: string]> = {
  equipotential: ['equipotential', 'equipotentials'],
  flowLine: ['flow line', 'flow lines'],
  phreaticLine: ['free surface', 'free surfaces'],
};

/** Words of taking computed lines into the net. */
const en = {
  title: 'Adopt computed lines',
  lead: 'An adopted line is kept as a traced one, marked as adopted. Figures read from adopted lines agree with this solution by construction: they are no check of it.',
  outOfDate: 'Solve again before lines are adopted: the net has changed.',
  all: (kind: AdoptableKind, count: number) =>
    count === 1 ? `Adopt the ${KINDS[kind][0]}` : `Adopt all ${count} ${KINDS[kind][1]}`,
  inPlace: (kind: AdoptableKind, count: number) =>
    count === 1
      ? `Adopt in place of the traced ${KINDS[kind][0]}`
      : `Adopt in place of the ${count} traced ${KINDS[kind][1]}`,
  beside: (kind: AdoptableKind, count: number) =>
    kind === 'flowLine'
      ? `Beside ${count} traced ${KINDS[kind][count === 1 ? 0 : 1]} the adopted ones would make channels of their own.`
      : `Beside ${count} traced ${KINDS[kind][count === 1 ? 0 : 1]} the adopted ones would be counted twice.`,
  one: (label: string) => `Adopt ${label}`,
  adopt: 'Adopt',
  isAdopted: 'adopted',
  oneByOne: 'One by one',
  pick: 'Or click a computed line on the sheet.',
  picked: 'Picked on the sheet:',
  lineLabel: (kind: AdoptableKind, figure: string) =>
    figure === '' ? KINDS[kind][0] : `${KINDS[kind][0]} ${figure}`,
  /** Steps, as undo lists them. */
  adopted: (kind: AdoptableKind, count: number, inPlace: boolean) =>
    `adopted ${count} computed ${KINDS[kind][count === 1 ? 0 : 1]}${inPlace ? ' in place of the traced' : ''}`,
  ofLine:
    'Adopted from the computed net. Figures read from it agree with the independent solution by construction.',
} as const;

export const adoptionText = inLanguage({ en });

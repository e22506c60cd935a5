import type { CheckListItem } from '#shared/contract/check-list.ts';

/** What a reviewer of a flow net looks at, as long as the dam's team has made no list of its own. */
export const DEFAULT_CHECK_LIST: readonly CheckListItem[] = [
  { id: 'drawing', text: 'The drawing and its revision are the right ones, as built where that matters.' },
  { id: 'datum', text: 'The vertical datum is named, and levels and elevations are all above it.' },
  { id: 'units', text: 'The units of drawing, levels and permeability are right, and none is mixed up.' },
  { id: 'levels', text: 'Headwater and tailwater are those of the load case, with their source.' },
  {
    id: 'calibration',
    text: 'The known points are read rightly, and the residuals are small for this drawing.',
  },
  {
    id: 'boundaries',
    text: 'The boundary conditions are right: submerged faces, impervious base, phreatic line, drains and where water leaves.',
  },
  {
    id: 'square',
    text: 'Equipotentials and flow lines cross at right angles, and the cells are square (or stretched as the anisotropy asks).',
  },
  { id: 'drops', text: 'The drops Nd and channels Nf were counted again and agree.' },
  {
    id: 'points',
    text: 'The points lie where they are meant to, and their elevations are those of the tips.',
  },
  {
    id: 'permeability',
    text: 'The permeability and its anisotropy have a source, and the ± says how well they are known.',
  },
  { id: 'instruments', text: 'Where instruments are read, differences from the net are explained.' },
  { id: 'findings', text: 'What the net check questions is settled, or the reason why it stays is good.' },
  { id: 'notes', text: 'All notes on the net are answered.' },
];

/** The list of a dam: its own, or the usual one. */
export const checkListOf = (own: readonly CheckListItem[] | null): readonly CheckListItem[] =>
  own ?? DEFAULT_CHECK_LIST;

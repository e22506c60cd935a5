import type { MarginForm } from './margin-form.tsx';
import type { CellId } from './title-block-cells.ts';

/** The form each cell of the title block opens; the others lead off the desk's forms (dam, revisions). */
export const FORM_OF_CELL: Readonly<Partial<Record<CellId, MarginForm>>> = {
  section: { form: 'loadCase' },
  scale: { form: 'setOut' },
  residual: { form: 'setOut' },
  headwater: { form: 'water' },
  outlet: { form: 'water' },
  drops: { form: 'count' },
  channels: { form: 'count' },
  headPerDrop: { form: 'count' },
  permeability: { form: 'permeability' },
  seepage: { form: 'seepage' },
  netCheck: { form: 'findings' },
};

import { inLanguage } from './language.ts';

/** Words of the switch between the drawing and the section that it stands for. */
const en = {
  title: 'The section is shown',
  views: {
    sheet: 'As drawn',
    natural: 'Natural',
    transformed: 'Transformed',
  },
  titles: {
    sheet: 'The sheet as it is drawn',
    natural: 'The natural section, its two scales made one',
    transformed: 'The section in which an isotropic net has square cells',
  },
  drawnTransformed: 'Drawn as a transformed section: cells are squares as drawn.',
  noCommon: 'The soils differ in kh/kv or in dip: they have no common transformed view.',
} as const;
export const sectionViewText = inLanguage({ en });

import { inLanguage } from './language.ts';

/** Words of carrying a section to another sheet. */
const en = {
  button: 'Carry to another sheet',
  buttonOf: (section: string) => `Carry ${section} to another sheet`,
  title: (section: string) => `Carry ${section} to another sheet`,
  lead: 'For a new scan of the same drawing, or its next revision. Mark the same places on both sheets, such as corners of the frame or marks that cannot have moved; K1 on the one is K1 on the other. Two places are enough, more show how well the sheets agree. The section that stands here is left as it is.',
  fromSheet: (drawing: string) => `From: ${drawing}`,
  toSheet: (drawing: string) => `To: ${drawing}`,
  chooseDrawing: 'Drawing to carry to',
  sheetNumber: (page: number) => `Sheet ${page}`,
  noneChosen: 'Choose the drawing',
  noOther:
    'There is no other sheet of this dam that is ready. Upload the new scan among the drawings of the dam first.',
  shape: 'How the new sheet lies',
  shapes: {
    similarity: 'Turned, shifted, at another scale',
    affine: 'Stretched otherwise along and across besides (three places or more)',
  },
  places: 'Places marked on both sheets',
  place: 'Place',
  onOld: 'Old sheet x, y, px',
  onNew: 'New sheet x, y, px',
  residual: 'Residual, px',
  notYet: 'not yet',
  remove: (name: string) => `Remove ${name}`,
  removeShort: 'Remove',
  noPlaces:
    'No place has been marked yet. Click the first one on the old sheet, then the same on the new one.',
  needs: (count: number) => `Mark ${count} more ${count === 1 ? 'place' : 'places'} on both sheets.`,
  noMatch:
    'These places do not tell how the sheets lie on one another: they coincide, lie on one line, or would mirror the drawing.',
  noneLeftOver:
    'With so few places nothing is left over to tell how well the sheets agree: mark another one.',
  agreement: (sigma: string, worst: string, name: string) =>
    `Standard deviation of a coordinate ${sigma} px; ${name} is off the most, by ${worst} px. It goes into the accuracy of the known points.`,
  facts: (scale: string, degrees: string) => `One pixel becomes ${scale}; turned by ${degrees}°.`,
  nets: 'Nets to carry',
  preview: 'The lines of the first net are shown on the new sheet as they would lie.',
  sectionName: 'Name of the section there',
  carry: 'Carry across',
  carried: (section: string) => `${section} is on the new sheet.`,
} as const;
export const carryAcrossText = inLanguage({ en });

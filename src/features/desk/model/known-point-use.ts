import { type EntityOf, entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';

type SetOut = EntityOf<'setOut'>;

/** What the next known point is for: the first ones set the section out, as many as its scales need, and more check it. */
export function nextKnownPointUse(document: FlowNetDocument): EntityOf<'knownPoint'>['use'] {
  const setting = entitiesOf(document, 'knownPoint').filter(({ value }) => value.use === 'fit').length;
  return setting < settingPoints(singleOf(document, 'setOut')?.value) ? 'fit' : 'check';
}

/** A point tells two figures, unless one of them is left empty. */
function settingPoints(setOut: SetOut | undefined): number {
  switch (setOut?.scales) {
    case 'perspective':
      return 4;
    case 'stretchedPaper':
      return 3;
    case 'plottingExaggeration':
    case 'transformedSection':
      return setOut.level === 'sheet' ? 2 : 3;
    default:
      return 2;
  }
}

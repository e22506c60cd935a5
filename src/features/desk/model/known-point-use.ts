import { unknownsOf } from '#shared/compute/set-out-unknowns.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';

/** What the next known point is for: the first ones set the section out, as many as its scales need, and more check it. */
export function nextKnownPointUse(document: FlowNetDocument): EntityOf<'knownPoint'>['use'] {
  const setting = entitiesOf(document, 'knownPoint').filter(({ value }) => value.use === 'fit').length;
  const setOut = singleOf(document, 'setOut')?.value;
  const figures = unknownsOf(setOut?.scales ?? 'equal', setOut?.level === 'sheet');
  // A point tells two of them, its offset and its elevation.
  return setting < Math.ceil(figures / 2) ? 'fit' : 'check';
}

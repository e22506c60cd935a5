import type { AppDeps } from '#server/app-deps.ts';
import { createNoteService } from '#server/services/note-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import { demoId } from './demo-ids.ts';
import { colleague, engineer, reviewer } from './demo-people.ts';
import { netPoint, sectionBB, seepage } from './embankment.ts';
import { toSheet } from './sheet-frame.ts';

/** What Remi and Tove have written on the finished net. Notes that are there already are left alone. */
export async function addDemoNotes(deps: AppDeps, netId: string, document: FlowNetDocument): Promise<void> {
  const point = entitiesOf(document, 'readingPoint').find(({ value }) => value.name === 'P3');
  if (point?.value.place.on !== 'section') throw new Error('The demo net has no point P3.');
  const { offset, elevation } = point.value.place;
  await inTransaction(deps, async (tx) => {
    const notes = createNoteService(tx);
    await notes.write(
      netId,
      {
        id: demoId(60),
        anchor: { on: 'readingPoint', entityId: point.id, at: toSheet(sectionBB, offset, elevation) },
        text: 'The register gives the tip of P3 at 101.40. Is that from the installation record or from the design?',
      },
      reviewer,
    );
    await notes.write(
      netId,
      {
        id: demoId(61),
        anchor: { on: 'place', at: toSheet(sectionBB, ...netPoint(0, 1)) },
        text: 'The blanket was cleaned out in 2019 and ran clear. I have the photographs.',
      },
      colleague,
    );
    await notes.write(
      netId,
      {
        id: demoId(62),
        anchor: { on: 'place', at: toSheet(sectionBB, ...netPoint(seepage.H, 0.5)) },
        text: 'Is the upstream shell really free draining after sixty years? The net stands on it.',
      },
      reviewer,
    );
    await notes.answer(
      demoId(62),
      { id: demoId(63), text: 'The standpipe in the shell follows the reservoir within a day.' },
      engineer,
    );
  });
}

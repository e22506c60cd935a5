import type { AppDeps } from '#server/app-deps.ts';
import { NetEntity } from '#server/entities/net-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { readDocument } from '#server/services/net-document.ts';
import { placeOfNet } from '#server/services/net-place.ts';
import { readInThread } from '#server/services/reading-threads.ts';
import { openItemsOf } from '#server/services/sending-queries.ts';
import { createSendingService } from '#server/services/sending-service.ts';
import { inTransaction, type ServiceDeps } from '#server/services/service-deps.ts';
import { addDemoDam, addDemoDrawing } from './demo-drawings.ts';
import { demoId } from './demo-ids.ts';
import { apronNet, fullSupplyNet, halfTracedNet, sectionCCKnownPoints } from './demo-nets.ts';
import { addDemoNotes } from './demo-notes.ts';
import { addDemoPeople, demoPeople, engineer, reviewer } from './demo-people.ts';
import { addDemoNet, addDemoSection } from './demo-sections.ts';

const sectionB = demoId(20);
const sectionC = demoId(21);
const spillwayAxis = demoId(22);
export const fullSupply = demoId(30);
const redrawn = demoId(31);
const sectionCNet = demoId(32);
export const apron = demoId(33);

/** True when somebody else's people are here: then the demo has no place in this database. */
export async function isTaken({ db }: AppDeps): Promise<boolean> {
  const people = await db.manager.find(PersonEntity);
  return people.some(({ id }) => !demoPeople.some((person) => person.id === id));
}

/** Fills a database with Harrow Fen Dam. Each step leaves what is there, so a seed cut off half way can be run again. */
export async function seedDemo(deps: AppDeps): Promise<void> {
  await addDemoPeople(deps.db.manager);
  await addDemoDam(deps);
  const [sheetB = '', sheetC = ''] = await addDemoDrawing(deps, 'crossSections');
  const [apronSheet = ''] = await addDemoDrawing(deps, 'spillway');
  await addDemoDrawing(deps, 'raising');

  await addDemoSection(deps, { id: sectionB, sheetId: sheetB, name: 'B–B', chainage: '212' });
  await addDemoSection(deps, { id: sectionC, sheetId: sheetC, name: 'C–C', chainage: '305' });
  await addDemoSection(deps, { id: spillwayAxis, sheetId: apronSheet, name: 'Spillway axis', chainage: '' });
  await addDemoNet(deps, sectionB, { id: fullSupply, name: 'Full supply' }, fullSupplyNet());
  await addDemoNet(deps, sectionB, { id: redrawn, name: 'Redrawn for the review' }, halfTracedNet());
  await addDemoNet(
    deps,
    sectionC,
    { id: sectionCNet, name: 'Full supply' },
    {
      section: sectionCCKnownPoints(),
      entities: [],
      singles: { setOut: { statedScale: 400, upstream: 'left' } },
    },
  );
  await addDemoNet(deps, spillwayAxis, { id: apron, name: 'Full supply' }, apronNet());

  const document = await readDocument(deps.db.manager, await placeOfNet(deps.db.manager, fullSupply));
  await addDemoNotes(deps, fullSupply, document);
  await sendApron(deps);
}

/** Gives the reviewer something to check, and the outbox a mail. */
async function sendApron(deps: AppDeps): Promise<void> {
  await inTransaction(deps, async (tx) => {
    const { changeNumber } = await tx.manager.findOneByOrFail(NetEntity, { id: apron });
    const message = 'The tailwater is the lowest of the last ten years. Please check S3 first.';
    const input = {
      id: demoId(70),
      reviewerIds: [reviewer.id],
      dueOn: null,
      message,
      blindFirst: false,
      reasons: await demoReasons(tx),
      changeNumber: Number(changeNumber),
    };
    await createSendingService(tx).send(apron, input, engineer);
  });
}

/** What is open on the demo's net stays open, as somebody would say it. */
async function demoReasons({ manager }: ServiceDeps) {
  const document = await readDocument(manager, await placeOfNet(manager, apron));
  const open = await openItemsOf(manager, apron, document, await readInThread(document));
  return open.map(({ key }) => ({ key, reason: 'As on the drawing of 1974; nothing better is known.' }));
}

import type { AppDeps } from '#server/app-deps.ts';
import { CommandBatchEntity, NetEntity, SectionEntity } from '#server/entities/net-entity.ts';
import { createCommandService } from '#server/services/command-service.ts';
import { readDocument } from '#server/services/net-document.ts';
import { placeOfNet } from '#server/services/net-place.ts';
import { createNetService } from '#server/services/net-service.ts';
import { createSectionService } from '#server/services/section-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { demoOps } from './demo-commands.ts';
import { demoId } from './demo-ids.ts';
import type { DemoNet } from './demo-nets.ts';
import { engineer } from './demo-people.ts';

interface DemoSection {
  id: string;
  sheetId: string;
  name: string;
  chainage: string;
}

/** Adds a section over the whole of its sheet, unless it is there. */
export async function addDemoSection(deps: AppDeps, { sheetId, ...section }: DemoSection): Promise<void> {
  await inTransaction(deps, async (tx) => {
    if (await tx.manager.existsBy(SectionEntity, { id: section.id })) return;
    await createSectionService(tx).create(sheetId, { ...section, frame: null }, engineer);
  });
}

/** Adds a net to a section and traces it with the commands the desk would send, once. */
export async function addDemoNet(
  deps: AppDeps,
  sectionId: string,
  net: { id: string; name: string },
  demo: DemoNet,
): Promise<void> {
  await inTransaction(deps, async (tx) => {
    if (!(await tx.manager.existsBy(NetEntity, { id: net.id })))
      await createNetService(tx).create(sectionId, net, engineer);
    const batch = { clientId: demoId(90), seq: 1 };
    if (await tx.manager.existsBy(CommandBatchEntity, { netId: net.id, ...batch })) return;
    const document = await readDocument(tx.manager, await placeOfNet(tx.manager, net.id));
    const ops = demoOps(document, demo);
    const label = demo.entities.length > 0 ? 'traced the net' : 'put the section to scale';
    await createCommandService(tx).apply(net.id, { ...batch, label, ops }, engineer);
  });
}

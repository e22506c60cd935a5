import { entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { levelText } from './title-block.ts';

/** Where the water leaves and in what state each outlet is: tailwater, drains and faces of free outflow. */
export function outletStates(document: FlowNetDocument, reading: NetReading): string[] {
  const tailwater = singleOf(document, 'waterLevels')?.value.tailwater ?? null;
  const states = tailwater === null ? [] : [`tailwater ${levelText(document, tailwater)}`];
  for (const { id, value } of entitiesOf(document, 'line')) {
    if (!value.finished) continue;
    if (value.line === 'drain') {
      const level = value.head ?? reading.lines.find((line) => line.id === id)?.head ?? null;
      const where = level === null ? 'at its own elevation' : `at ${levelText(document, level)}`;
      states.push(`${value.name || 'drain'} ${value.head === null ? 'empty' : 'under pressure'} ${where}`);
    }
    if (value.line === 'outflowFace')
      states.push(`${value.name || 'face of free outflow'} at its own elevation`);
  }
  return states;
}

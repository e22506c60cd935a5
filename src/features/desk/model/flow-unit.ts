import { createStore } from 'zustand/vanilla';
import { FLOW_UNITS, type FlowUnit } from '#shared/compute/quantities/seepage-volume.ts';
import type { UnitSystem } from '#shared/contract/document.ts';

const KEPT_UNDER = 'tracehead seepage unit';

/** The unit in which this browser shows seepages; null = the document's own, m³/s or ft³/s. */
export const flowUnitChoice = createStore<{ readonly unit: FlowUnit | null }>(() => ({ unit: keptUnit() }));

/** Shows seepages in a unit from now on, on this browser. */
export function chooseFlowUnit(unit: FlowUnit): void {
  flowUnitChoice.setState({ unit });
  try {
    globalThis.localStorage?.setItem(KEPT_UNDER, unit);
  } catch {
    // A browser that keeps nothing shows the choice until the page is left.
  }
}

export function ownFlowUnit(system: UnitSystem): FlowUnit {
  return system === 'SI' ? 'm³/s' : 'ft³/s';
}

function keptUnit(): FlowUnit | null {
  try {
    const kept = globalThis.localStorage?.getItem(KEPT_UNDER);
    return FLOW_UNITS.find((unit) => unit === kept) ?? null;
  } catch {
    return null;
  }
}

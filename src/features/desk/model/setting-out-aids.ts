import { createStore } from 'zustand/vanilla';

/** Aids to setting out that a person keeps from one net to the next. */
export type SettingOutAids = {
  /** Known points go to the crossing of two drawn lines. */
  readonly takesCrossings: boolean;
  /** Lines of equal offset and elevation lie over the sheet. */
  readonly showsGrid: boolean;
};

const KEPT_UNDER = 'tracehead aids to setting out';
const FIRST: SettingOutAids = { takesCrossings: true, showsGrid: false };

export const settingOutAids = createStore<SettingOutAids>(() => ({ ...FIRST, ...kept() }));

export function changeSettingOutAids(changes: Partial<SettingOutAids>): void {
  settingOutAids.setState(changes);
  const { takesCrossings, showsGrid } = settingOutAids.getState();
  try {
    globalThis.localStorage?.setItem(KEPT_UNDER, JSON.stringify({ takesCrossings, showsGrid }));
  } catch {
    // A browser that keeps nothing has them so until the page is left.
  }
}

export function toggleGrid(): void {
  changeSettingOutAids({ showsGrid: !settingOutAids.getState().showsGrid });
}

function kept(): Partial<SettingOutAids> {
  try {
    const json: unknown = JSON.parse(globalThis.localStorage?.getItem(KEPT_UNDER) ?? '{}');
    const held = typeof json === 'object' && json !== null ? (json as Record<string, unknown>) : {};
    return {
      ...(typeof held.takesCrossings === 'boolean' && { takesCrossings: held.takesCrossings }),
      ...(typeof held.showsGrid === 'boolean' && { showsGrid: held.showsGrid }),
    };
  } catch {
    return {};
  }
}

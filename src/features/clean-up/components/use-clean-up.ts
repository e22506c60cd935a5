import { useEffect, useState } from 'react';
import { throughPlane } from '#shared/compute/plane-map.ts';
import { renditionGeometry } from '#shared/compute/renditions/rendition-geometry.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import type { RenditionSettings } from '#shared/contract/renditions.ts';
import { firstHandles, type Place, type Setting, shownWhile, withHandles } from '../model/handles.ts';
import { keepSettings, keptSettings } from '../model/kept-settings.ts';

/** What is being set for a sheet: settings that are not used yet, handles over its picture, and where it is looked at closely. */
export function useCleanUp(sheet: SheetDto, first: RenditionSettings) {
  const [settings, change] = useState(() => keptSettings(sheet.id) ?? first);
  const [setting, setSetting] = useState<Setting | null>(null);
  const [places, setPlaces] = useState<readonly Place[]>([]);
  const [refused, setRefused] = useState(false);
  const [closeUpAt, setCloseUpAt] = useState<Place>([sheet.widthPx / 2, sheet.heightPx / 2]);
  const shown = shownWhile(settings, setting);
  const geometry = renditionGeometry(sheet, shown);
  useEffect(() => keepSettings(sheet.id, settings), [sheet.id, settings]);

  /** Looks closely at a place of the picture that is shown. */
  function lookAt([x, y]: Place): void {
    if (geometry !== null) setCloseUpAt(throughPlane(geometry.toBase, x, y));
  }

  function begin(next: Setting | null): void {
    setRefused(false);
    setSetting(next);
    const size = next && renditionGeometry(sheet, shownWhile(settings, next));
    if (next && size) setPlaces(firstHandles(next, settings, size));
  }

  return {
    settings,
    setSettings: change,
    shown,
    setting,
    begin,
    refused,
    handles: setting && geometry ? { setting, places, size: geometry } : null,
    moveHandles(next: readonly Place[], moved: number) {
      setRefused(false);
      setPlaces(next);
      const at = next[moved];
      if (at) lookAt(at);
    },
    apply() {
      const changed = setting && withHandles(settings, setting, places, sheet);
      if (!changed) return setRefused(true);
      change(changed);
      setSetting(null);
    },
    closeUpAt,
    lookAt,
  };
}

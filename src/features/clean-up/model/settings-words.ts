import { fixedText } from '#client/lib/figures.ts';
import { cleanUpText } from '#client/text/clean-up.ts';
import type { RenditionSettings } from '#shared/contract/renditions.ts';

/** What was done to a picture, in a few words: "turned 1.25°, black and white". */
export function settingsWords(settings: RenditionSettings): string {
  const { what } = cleanUpText;
  const hasLevels = settings.black > 0 || settings.white < 255;
  const words = [
    settings.corners && what.corners,
    settings.turnDeg !== 0 && what.turned(fixedText(settings.turnDeg, 2)),
    settings.crop && what.crop,
    settings.whitenPaper && what.whiten,
    settings.specksPx > 0 && what.specks,
    hasLevels && what.levels,
    settings.threshold !== null && what.threshold,
    settings.invert && what.invert,
  ].filter((each): each is string => typeof each === 'string');
  return words.length === 0 ? what.nothing : words.join(', ');
}

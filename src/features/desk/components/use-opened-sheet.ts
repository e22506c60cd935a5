import { useState } from 'react';
import type { SheetDto } from '#shared/contract/drawings.ts';

/**
 * The sheet as it was opened, as long as it is the same picture: while finer tiles of it are being made, view, tools
 * and what is being drawn stay as they are.
 */
export function useOpenedSheet(sheet: SheetDto): SheetDto {
  const [opened, setOpened] = useState(sheet);
  if (opened === sheet || isSamePicture(opened, sheet)) return opened;
  setOpened(sheet);
  return sheet;
}

function isSamePicture(a: SheetDto, b: SheetDto): boolean {
  return a.id === b.id && a.tiles.rendition === b.tiles.rendition && a.shown?.id === b.shown?.id;
}

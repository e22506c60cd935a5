import { useEffect, useState } from 'react';
import type { SheetDto } from '#shared/contract/drawings.ts';
import { loadSmall } from '../model/load-pixels.ts';
import { type SmallSheet, smallSheetOf } from '../model/preview.ts';

/** The sheet in small, to show at once what settings make of it. */
export function useSmallSheet(sheet: SheetDto): { small: SmallSheet | null; failed: boolean } {
  const [small, setSmall] = useState<SmallSheet | null>(null);
  const [failed, setFailed] = useState(false);
  useEffect(() => {
    const left = new AbortController();
    loadSmall(sheet, left.signal).then(
      (rows) => !left.signal.aborted && setSmall(smallSheetOf(rows, sheet)),
      () => !left.signal.aborted && setFailed(true),
    );
    return () => left.abort();
  }, [sheet]);
  return { small, failed };
}

import type { DoubtShares } from '#shared/contract/reading-doubt.ts';
import type { SheetBlock, SheetChapter, SheetSource } from './content.ts';
import { DOUBT_NAMES } from './words.ts';

/** Where the ± come from. Null when the reading holds none. */
export function doubtChapter({ reading }: SheetSource): SheetChapter | null {
  const rows = reading.points.flatMap((point) =>
    point.doubt === null
      ? []
      : [[point.name, sharesText(point.doubt.totalHead), sharesText(point.doubt.porePressure)]],
  );
  const seepage = reading.doubt.seepageShares;
  if (rows.length === 0 && seepage.length === 0) return null;
  const table: SheetBlock = {
    kind: 'table',
    caption: 'Shares of the variance by source',
    columns: [
      { label: 'Point', align: 'left', weight: 1 },
      { label: '± of the total head', align: 'left', weight: 3 },
      { label: '± of the pore pressure', align: 'left', weight: 3 },
    ],
    rows,
  };
  return {
    id: 'doubt',
    title: '± and where it comes from',
    blocks: [
      ...(rows.length === 0 ? [] : [table]),
      ...(seepage.length === 0
        ? []
        : [{ kind: 'paragraph', text: `Seepage: ${sharesText(seepage)}.` } as const]),
    ],
  };
}

const sharesText = (shares: DoubtShares) =>
  shares
    .map(
      ({ source, part }) => `${DOUBT_NAMES[source]} ${part < 0.005 ? 'below 1' : Math.round(part * 100)} %`,
    )
    .join(', ');

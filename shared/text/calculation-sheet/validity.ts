import { singleOf } from '#shared/contract/document.ts';
import type { SheetChapter, SheetSource } from './content.ts';
import { outletStates } from './outlets.ts';
import { levelText } from './title-block.ts';
import { momentText, NOT_STATED, orNotStated } from './words.ts';

/** For which state the sheet holds, on what it rests, and where it is signed and stamped. */
export function validityChapter(source: SheetSource): SheetChapter {
  const { document, reading, status } = source;
  const levels = singleOf(document, 'waterLevels')?.value;
  const outlets = outletStates(document, reading).join('; ') || NOT_STATED;
  const state = [
    `Headwater ${levelText(document, levels?.headwater ?? null)}; ${outlets}.`,
    'Steady seepage at these levels only, with drains in the state given here. Not for drawdown, filling, earthquake or any other state that changes with time.',
    status.kind === 'draft'
      ? `The net as it stood at ${momentText(status.at)}. A draft is no record: it may have changed since.`
      : `The net as it was frozen at ${momentText(status.sentAt)} as revision ${status.label}.`,
  ];
  return {
    id: 'validity',
    title: 'Validity and assumptions',
    blocks: [
      { kind: 'facts', rows: [{ label: 'Job number', value: orNotStated(source.jobNumber) }] },
      { kind: 'paragraph', text: 'This sheet holds for:' },
      { kind: 'list', items: state },
      { kind: 'paragraph', text: 'It assumes that:' },
      { kind: 'list', items: assumptions(source) },
      {
        kind: 'boxes',
        boxes: [
          { label: 'Engineer: name, capacity, date, signature', value: '' },
          { label: 'Registration number', value: '' },
          { label: 'Stamp', value: '' },
        ],
      },
    ],
  };
}

function assumptions({ document, reading }: SheetSource): string[] {
  const { frame, quantities } = reading;
  const gamma = quantities.gammaW === null ? '' : ' Suction above the phreatic line is left out.';
  const judged = {
    natural: 'The soil conducts alike in all directions; squares are judged in the section as it is.',
    transformed: `The soil conducts unlike along and across its bedding (kh/kv = ${frame ? Number(frame.ratio.toPrecision(3)) : ''}); the net is judged in the transformed section.`,
    none: 'The soils share no transformed section; cells are not judged.',
  } as const;
  return [
    'Flow is plane, laminar and follows Darcy’s law; soil and water do not change in volume.',
    `The net on the drawing, as traced, is a true net of the section for the levels above.${gamma}`,
    frame === null ? 'The section is not set out, so its cells are not judged.' : judged[frame.kind],
    `Elevations are above ${document.datum.trim() || 'a datum without a name'}.`,
  ];
}

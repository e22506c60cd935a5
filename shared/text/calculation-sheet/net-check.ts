import type { Finding } from '#shared/contract/reading.ts';
import { fixedText, plainText } from '#shared/text/number-text.ts';
import type { SheetBlock, SheetChapter, SheetSource } from './content.ts';

/** Worst places that are printed; the others are counted. */
const FAULTS_SHOWN = 12;

/** The net's own drawing judged, and what is missing, wrong or questioned. */
export function netCheckChapter({ reading }: SheetSource): SheetChapter {
  const { netCheck, findings } = reading;
  const items = findings.map(findingText);
  return {
    id: 'net-check',
    title: 'Net check',
    blocks: [
      { kind: 'paragraph', text: netCheck?.summary.text ?? 'The net could not be checked.' },
      ...(netCheck === null ? [] : checkedBlocks(netCheck)),
      ...(items.length === 0
        ? [{ kind: 'paragraph', text: 'Nothing is missing or questioned.' } as const]
        : [{ kind: 'paragraph', text: 'Findings:' } as const, { kind: 'list', items } as const]),
      {
        kind: 'paragraph',
        text: 'An independent solution of the section is no part of this record.',
      },
    ],
  };
}

function checkedBlocks(check: NonNullable<SheetSource['reading']['netCheck']>): SheetBlock[] {
  const { summary, faults } = check;
  const shown = faults.slice(0, FAULTS_SHOWN);
  const rest = faults.length - shown.length;
  return [
    {
      kind: 'facts',
      rows: [
        { label: 'Cells', value: `${summary.cellsJudged} judged, ${summary.cellsPoor} poor` },
        { label: 'Angles', value: `${summary.anglesJudged} judged, ${summary.anglesPoor} poor` },
        { label: 'Channels', value: `${check.channels.length}, ${summary.channelsPoor} poor` },
        {
          label: 'B/L entered and measured',
          value: `${plainText(check.enteredRatio)} and ${plainText(check.measuredRatio, 3)}`,
        },
        { label: 'Nf·(B/L) as measured', value: plainText(check.measuredFlow, 3) },
      ],
    },
    ...(shown.length === 0
      ? []
      : [
          {
            kind: 'list',
            items: [
              ...shown.map(
                (fault) =>
                  `${fault.text} May shift the head beside it by ${fixedText(fault.effect.drops, 2)} drop.`,
              ),
              ...(rest > 0 ? [`And ${rest} more with smaller effects.`] : []),
            ],
          } as const,
        ]),
  ];
}

const WEIGHTS: Record<Finding['weight'], string> = {
  missing: 'Missing',
  wrong: 'Wrong',
  question: 'Questioned',
  note: 'Note',
};
const findingText = ({ weight, text }: Finding) => `${WEIGHTS[weight]}: ${text}`;

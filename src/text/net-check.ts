import { fixedText, plainText, signedText } from '#client/lib/figures.ts';
import { inLanguage } from './language.ts';

/** Words of the net check beside the sheet. */
const enNetCheckText = {
  title: 'Net check',
  drawing: 'How the net is drawn',
  working: 'The net is being read…',
  none: 'There is no net to check yet.',
  show: 'Show on the sheet',
  worst: 'Where it is poor, by effect on the heads',
  worstLead:
    'Of the shape alone: by how much the head beside the place may be off. Angles and squares are judged in the section in which cells should be square.',
  allGood: 'No cell and no angle is poor.',
  effect: (drops: number) => `± ${fixedText(drops, 2)} drop`,
  pressure: (value: number, unit: string) => `${plainText(value, 2)} ${unit}`,
  between: (before: string, after: string) => `Between ${before} and ${after}`,
  inChannel: (number: number) => `channel ${number}`,
  on: (line: string) => `On ${line}`,
  drop: (drops: string) => `the line ${drops} drops down`,
  aLine: 'a line without a head',
  channels: 'Channels',
  channel: (number: number) => `Channel ${number}`,
  channelFlow: 'Flow beside the others',
  channelStates: {
    good: 'as the others',
    poor: 'differs',
    partChannel: 'part of a channel',
    notJudged: 'not judged',
  },
  counts: (cells: number, poorCells: number, angles: number, poorAngles: number) =>
    `${poorCells} of ${cells} cells judged and ${poorAngles} of ${angles} angles judged are poor.`,
  found: 'Questions and notes',
  independent: 'Independent solution',
  independentLead:
    'The section solved from its boundaries, levels and permeabilities alone, without the lines traced.',
  open: 'Open the independent solution',
} as const;
export const netCheckText = inLanguage({ en: enNetCheckText });

/** Words drawn over the sheet. */
const enCheckMarkText = {
  ratio: (ratio: number) => `B/L ${fixedText(ratio, 2)}`,
  angle: (degrees: number) => `${Math.round(degrees)}°`,
  channel: (share: number) => `flow × ${fixedText(share, 2)}`,
  part: (part: number) => fixedText(part, 2),
  difference: (head: number, unit: string) => `${signedText(head, 2)} ${unit}`,
} as const;
export const checkMarkText = inLanguage({ en: enCheckMarkText });

import { type BlindRow, compareBlind } from '#shared/compute/blind-reading.ts';
import type { AnsweredItem, CheckAnswer } from '#shared/contract/check-list.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { BlindReading, CheckedFigure, FrozenCheck, ReviewDto } from '#shared/contract/review.ts';
import { DECISION_WORDS } from '#shared/text/decision-words.ts';
import { fixedText, plainText, signedText } from '#shared/text/number-text.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { SheetBlock, SheetChapter, SheetFact, SheetSource } from './content.ts';
import { momentText } from './words.ts';

/**
 * What the reviewers did before they decided: who opened the figures when, readings made blind beside the engineer's, which
 * figures were ticked and how the check list was answered. Null for a draft and where nothing of it is recorded.
 */
export function checkChapter({ status, document, reading }: SheetSource): SheetChapter | null {
  if (status.kind === 'draft') return null;
  const { openings, blindReadings, checks } = status.review;
  const blocks = [
    ...openingFacts(openings),
    ...blindReadings.flatMap((each) => blindBlocks(each, document, reading)),
    ...checks.flatMap((each) => (each.check === null ? [] : checkBlocks(each, each.check))),
  ];
  return blocks.length === 0 ? null : { id: 'check', title: 'Check before the decision', blocks };
}

function openingFacts(openings: ReviewDto['openings']): SheetBlock[] {
  if (openings.length === 0) return [];
  const rows = openings.map(({ person, at }) => ({
    label: 'Figures opened',
    value: `by ${person.name}, ${momentText(at)}, without reading blind`,
  }));
  return [{ kind: 'facts', rows }];
}

function blindBlocks(
  { person, at, reading: own, hash }: ReviewDto['blindReadings'][number],
  document: FlowNetDocument,
  reading: NetReading,
): SheetBlock[] {
  const rows: SheetFact[] = [
    { label: 'Read blind', value: `by ${person.name}, ${momentText(at)}` },
    { label: 'What was known', value: blindKnowledge(own).join(' ') },
    ...levelFacts(own, document, reading),
    { label: 'SHA-256 of the reading', value: hash },
  ];
  return [{ kind: 'facts', rows }, blindTable(compareBlind(own.points, reading.points), document)];
}

/** What the reviewer could know of the engineer's reading when making their own. */
export function blindKnowledge({ placesShownAt, figuresMailed }: BlindReading): string[] {
  return [
    placesShownAt === null
      ? 'The points were placed by the reviewer without seeing where the engineer has them.'
      : 'The reviewer was shown where the points lie, without figures.',
    figuresMailed
      ? 'The mail about the revision told the main figures and showed where the points lie.'
      : 'The mail about the revision told neither figures nor places.',
    'The figures were kept back from when it was sent; what was seen of the net before is not known.',
  ];
}

function levelFacts(
  { drops, headwater, outletHead, gammaW }: BlindReading,
  { unitSystem, datum }: FlowNetDocument,
  { quantities }: NetReading,
): SheetFact[] {
  const unit = elevationUnit(unitSystem, datum);
  const decimals = DECIMALS[unitSystem].elevation;
  return [
    ...(drops === null
      ? []
      : [
          {
            label: 'Drops Nd',
            value: `${plainText(drops)} by the reviewer’s count, ${plainText(quantities.drops)} by the engineer`,
          },
        ]),
    {
      label: 'Read between',
      value: `${fixedText(headwater, decimals)} and ${fixedText(outletHead, decimals)} ${unit}, with γw ${plainText(gammaW)} ${unitNames(unitSystem).unitWeight}`,
    },
  ];
}

function blindTable(rows: readonly BlindRow[], { unitSystem, datum }: FlowNetDocument): SheetBlock {
  const decimals = DECIMALS[unitSystem];
  const { pressure } = unitNames(unitSystem);
  const elevation = elevationUnit(unitSystem, datum);
  const right = (label: string, weight: number) => ({ label, align: 'right', weight }) as const;
  return {
    kind: 'table',
    caption: 'Read blind by the reviewer, beside the engineer’s figures. ± of the engineer’s, 95 %.',
    columns: [
      { label: 'Point', align: 'left', weight: 1.5 },
      right(`z, ${elevation}: own / net`, 2),
      right('Drops: own / net', 1.7),
      right(`h, ${elevation}: own / net`, 2),
      right('Δh', 1),
      right(`u, ${pressure}: own / net`, 2),
      right('Δu', 1),
      right('± of u', 1),
      { label: 'u within ±', align: 'left', weight: 1.2 },
      { label: 'Remark', align: 'left', weight: 2 },
    ],
    rows: rows.map((row) => [
      row.name || 'unnamed',
      both(row.elevation, decimals.elevation),
      both(row.dropsLost, decimals.drops),
      both(row.totalHead, decimals.head),
      signedText(row.totalHead.difference, decimals.head),
      both(row.porePressure, decimals.pressure),
      signedText(row.porePressure.difference, decimals.pressure),
      fixedText(row.porePressure.plusMinus, decimals.pressure),
      withinWords(row.porePressure.within),
      row.remark,
    ]),
  };
}

const both = ({ own, net }: BlindRow['elevation'], decimals: number) =>
  `${fixedText(own, decimals)} / ${fixedText(net, decimals)}`;

const withinWords = (within: boolean | null) => (within === null ? 'not told' : within ? 'yes' : 'NO');

function checkBlocks(
  { person, at, decision, hash }: ReviewDto['checks'][number],
  { figures, checkList }: FrozenCheck,
): SheetBlock[] {
  const state = DECISION_WORDS[decision].state;
  return [
    {
      kind: 'facts',
      rows: [
        { label: 'Checked by', value: `${person.name}, ${state}, ${momentText(at)}` },
        { label: 'Figures ticked', value: tickedText(figures) },
        { label: 'SHA-256 of the check', value: hash },
      ],
    },
    ...(figures.length === 0 ? [] : [tickTable(figures)]),
    checkList.length === 0
      ? { kind: 'paragraph', text: 'The dam had no check list.' }
      : checkListTable(checkList),
  ];
}

export const tickedText = (figures: readonly CheckedFigure[]) =>
  `${figures.filter(({ ticked }) => ticked).length} of ${figures.length}`;

/** What was ticked of each point and part, so that a long schedule stays a line for each point. */
function tickTable(figures: readonly CheckedFigure[]): SheetBlock {
  const parts = [...new Set(figures.map((each) => each.of))];
  const named = (of: string, ticked: boolean) =>
    figures
      .filter((each) => each.of === of && each.ticked === ticked)
      .map(({ what, value }) => `${what} ${value}`)
      .join('; ');
  return {
    kind: 'table',
    caption: 'Figures ticked by the reviewer',
    columns: [
      { label: 'Of', align: 'left', weight: 1.2 },
      { label: 'Ticked', align: 'left', weight: 3 },
      { label: 'Not ticked', align: 'left', weight: 2 },
    ],
    rows: parts.map((of) => [of, named(of, true) || 'none', named(of, false) || 'none']),
  };
}

const ANSWERS: Record<CheckAnswer, string> = { yes: 'yes', no: 'NO', notApplicable: 'does not apply' };

function checkListTable(checkList: readonly AnsweredItem[]): SheetBlock {
  return {
    kind: 'table',
    caption: 'Check list of the dam, as it stood',
    columns: [
      { label: 'Asked', align: 'left', weight: 4 },
      { label: 'Answer', align: 'left', weight: 1.2 },
      { label: 'Remark', align: 'left', weight: 2 },
    ],
    rows: checkList.map(({ text, answer, remark }) => [
      text,
      answer === null ? 'not answered' : ANSWERS[answer],
      remark,
    ]),
  };
}

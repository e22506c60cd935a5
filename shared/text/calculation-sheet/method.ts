import { entitiesOf } from '#shared/contract/document.ts';
import type { SheetBlock, SheetChapter, SheetSource } from './content.ts';
import { lowered } from './rich-text.ts';

const [nd, nf, kh, kv, gw, ic, gs] = [
  `N${lowered('d')}`,
  `N${lowered('f')}`,
  `k${lowered('h')}`,
  `k${lowered('v')}`,
  `γ${lowered('w')}`,
  `i${lowered('c')}`,
  `γ${lowered('sat')}`,
];

/** That lines were not traced but adopted, which figures then agree with what by construction. */
function adoptedLines({ document }: SheetSource): SheetBlock[] {
  const count = entitiesOf(document, 'line').filter(({ value }) => value.origin === 'adopted').length;
  if (count === 0) return [];
  const lines = count === 1 ? 'One line of the net was' : `${count} lines of the net were`;
  const text = `${lines} adopted from the computed net of the independent solution. Figures read from adopted lines agree with that solution by construction, and are no check of it.`;
  return [{ kind: 'paragraph', text }];
}

/** How the figures come about: formulas with their symbols, and the points' own explanations. */
export function methodChapter(source: SheetSource): SheetChapter {
  const { reading } = source;
  const explained = reading.points.filter((point) => point.explanation !== '');
  return {
    id: 'method',
    title: 'Method',
    blocks: [
      {
        kind: 'paragraph',
        text: 'The lines of the net were traced on the scan and put to scale by the known points. The head of each equipotential follows from its count of drops. Between two neighbouring lines the head is that of the field which takes their heads on them; the hand rule, by the ratio of the distances to both lines, stands beside it as a check.',
      },
      ...adoptedLines(source),
      {
        kind: 'list',
        items: [
          `Head per drop Δh = H / ${nd}, with H the head lost from headwater to outlet and ${nd} the number of drops.`,
          'Total head h = headwater − n·Δh, with n the drops lost up to the point.',
          'Pressure head = h − z, with z the elevation of the point.',
          `Pore pressure u = ${gw}·(h − z), with ${gw} the unit weight of water; 0 above the phreatic line.`,
          `Seepage q = k·Δh·${nf}·(B/L), with ${nf} the number of channels and B/L width over length of the cells. Where the soil conducts unlike along and across its bedding, k = √(${kh}·${kv}).`,
          `Exit gradient i = Δh / ℓ over the last cell of length ℓ; critical gradient ${ic} = (${gs} − ${gw}) / ${gw}; factor ${ic} / i, for upward flow through level ground only.`,
          `Uplift is the pressure u over a base, for a run of one length unit of the dam; pore pressure ratio r${lowered('u')} = u over the weight of the soil vertically above.`,
          '± hold the figure in 95 of 100 cases; the shares below are parts of the variance by source.',
        ],
      },
      ...(explained.length === 0
        ? []
        : [
            { kind: 'paragraph', text: 'How the figure of each point came about:' } as const,
            { kind: 'list', items: explained.map((point) => `${point.name}: ${point.explanation}`) } as const,
          ]),
    ],
  };
}

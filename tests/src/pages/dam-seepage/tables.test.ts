import { createElement, type ReactElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { MemoryRouter } from 'react-router-dom';
import { describe, expect, it } from 'vitest';
import { LengthTable } from '#client/pages/dam-seepage/length-table.tsx';
import { SectionsTable } from '#client/pages/dam-seepage/sections-table.tsx';
import type { DamSeepageDto } from '#shared/contract/dam-seepage.ts';
import { chosenNet, ids, seepageAlongDam } from '#tests/support/seepage-along-dam.ts';

/** The text of each row, cell by cell, as a reader of the page has it on a wide screen. */
function rowsOf(element: ReactElement): string[][] {
  const html = renderToStaticMarkup(createElement(MemoryRouter, null, element));
  return [...html.matchAll(/<tr[^>]*>(.*?)<\/tr>/g)].map(([, row = '']) =>
    [...row.matchAll(/<t[dh][^>]*>(.*?)<\/t[dh]>/g)].map(([, cell = '']) =>
      cell
        .replaceAll(/<span[^>]*aria-hidden[^>]*>.*?<\/span>/g, '')
        .replaceAll(/<select.*<\/select>/g, '')
        .replaceAll(/<[^>]+>/g, ''),
    ),
  );
}
const sections = (found: DamSeepageDto, isWorkingOut = false) =>
  rowsOf(
    createElement(SectionsTable, {
      found,
      netIds: found.chosen.map(({ netId }) => netId),
      unit: 'ft³/s',
      isWorkingOut,
      onChoose: () => {},
    }),
  );

const a = chosenNet(ids.a, { sectionId: 'section a', headwater: 30.48 });
const inFeet = seepageAlongDam({ unitSystem: 'US', chosen: [a] });

describe('the table of sections', () => {
  it('gives a dam in feet its levels in feet and the seepage per foot', () => {
    const [heads, row] = sections(inFeet);
    expect(heads?.slice(3)).toEqual([
      'Headwater, ft LD',
      'Tailwater, ft LD',
      'Per foot of dam, ft³/s',
      'Factor ×/÷',
    ]);
    // 30.48 m are 100 ft; 10⁻⁶ m²/s are 1.08·10⁻⁵ ft²/s (a foot is 0.3048 m by definition).
    expect(row?.slice(3)).toEqual(['100.00', '–', '1 × 10−5', '2.0']);
  });

  it('shows no figure of another choice while the new one is worked out', () => {
    const [, row] = sections(inFeet, true);
    expect(row?.slice(3)).toEqual(['working out…']);
  });

  it('says below a net why it is left out, and what of it does not count', () => {
    const leftOut = { code: 'noSeepage', text: 'Its net gives no seepage.' };
    const rows = sections(
      seepageAlongDam({
        chosen: [
          { ...a, tracedOnly: true },
          chosenNet(ids.b, { sectionId: 'section b', seepage: null, factor: null, leftOut }),
        ],
      }),
    );
    expect(rows[2]?.[0]).toMatch(/^Traced channels only/);
    expect(rows[3]?.slice(3)).toEqual(['30.00', '–', '–', '–']);
    expect(rows[4]?.[0]).toBe('Left out. Its net gives no seepage. Open the net');
  });
});

describe('the table over the length', () => {
  const found = seepageAlongDam({
    reaches: [{ from: 0, to: 30.48, length: 30.48, flow: 2e-4 }],
    total: { length: 30.48, flow: 2e-4, factor: 2.5, figures: 2 },
  });
  const length = (change: Partial<DamSeepageDto>) =>
    rowsOf(createElement(LengthTable, { found: { ...found, ...change }, unit: 'm³/day' }));

  it('gives the reaches and the total with its factor, in the unit chosen', () => {
    // 2·10⁻⁴ m³/s over 86,400 s.
    expect(length({}).slice(1)).toEqual([
      ['0.0', '30.5', '30.5', '17'],
      ['Total', '30.5', '17×/÷ 2.5'],
    ]);
    expect(length({ unitSystem: 'US' })[1]).toEqual(['0.0', '100.0', '100.0', '17']);
  });

  it('says where no factor is known, and that there is no total of one section', () => {
    const total = { length: 30.48, flow: 2e-4, factor: null, figures: 2 };
    expect(length({ total })[2]?.at(-1)).toContain('no factor entered');
    expect(length({ total: null, reaches: [] })).toEqual([]);
  });

  it('says every caution before the figures', () => {
    const html = renderToStaticMarkup(
      createElement(LengthTable, {
        found: { ...found, cautions: [{ code: 'headwatersDiffer', text: 'They differ.' }] },
        unit: 'm³/s',
      }),
    );
    expect(html.indexOf('They differ.')).toBeGreaterThan(-1);
    expect(html.indexOf('They differ.')).toBeLessThan(html.indexOf('<table'));
  });
});

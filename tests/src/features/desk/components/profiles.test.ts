import { createElement, type ReactElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { NoticeProvider } from '#client/components/notice.tsx';
import { ExitsPane } from '#client/features/desk/components/exits-pane.tsx';
import { PhreaticCheck } from '#client/features/desk/components/phreatic-check.tsx';
import { ProfilesPane } from '#client/features/desk/components/profiles-pane.tsx';
import { tableTsv } from '#client/features/desk/components/schedule-text.ts';
import { titleBlockCells } from '#client/features/desk/components/title-block-cells.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { addProfile, changeProfile, removeProfile } from '#client/features/desk/model/profile-edits.ts';
import { basicParabolaNet } from '#shared/compute/exact/basic-parabola-net.ts';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import type { FlowUnit } from '#shared/compute/quantities/seepage-volume.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { documentEntity, type EntityOf, type FlowNetDocument } from '#shared/contract/document.ts';
import { profileRows } from '#shared/text/profile-csv.ts';
import { changed, withAdded } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';

type Profile = EntityOf<'profile'>;

const APRON = { width: 20, headwater: 106, tailwater: 100, drops: 12, channels: 7 };
const apron = exactNetDocument(flatApronNet({ ...APRON, middle: [0, 98] }), { pxPerUnit: 55 });
const dam = exactNetDocument(basicParabolaNet({ head: 20, drops: 10, channels: 3, focus: [14, 98] }), {
  pxPerUnit: 110,
});
const profileOf = (changes: Partial<Profile> = {}): Profile => ({
  kind: 'profile',
  name: 'Underside',
  use: 'base',
  place: {
    on: 'section',
    points: [
      [-10, 98],
      [10, 98],
    ],
  },
  spacing: 1,
  finished: true,
  order: 1,
  ...changes,
});

function wordsOf(element: ReactElement): string {
  const markup = renderToStaticMarkup(createElement(NoticeProvider, null, element));
  return markup.replace(/<[^>]+>/g, ' ').replace(/\s+/g, ' ');
}

function opened(document: FlowNetDocument, readOnly = false) {
  return createDeskStore({ document }, { reading: readNet(document), readOnly });
}

function profilesPane(document: FlowNetDocument, readOnly = false): string {
  const props = { store: opened(document, readOnly), views: null, netName: 'B–B', onSheet: () => {} };
  return wordsOf(createElement(ProfilesPane, { ...props, onForm: readOnly ? null : () => {} }));
}

const exitsPane = (document: FlowNetDocument) =>
  wordsOf(createElement(ExitsPane, { store: opened(document), views: null }));

describe('the table of profiles', () => {
  it('says how to begin, and on a net that may not be changed only that there is none', () => {
    expect(profilesPane(apron)).toContain('Press L and click along a base');
    const words = profilesPane(apron, true);
    expect(words).toContain('No profiles on this net.');
    expect(words).not.toContain('Paste places');
  });

  it('gives a base its resultant, tailwater included and its excess apart (closed form γw·H·b/2)', () => {
    const words = profilesPane(withAdded(apron, profileOf()));
    const excess = Number(words.match(/Excess over tailwater (\d+\.\d)/)?.[1]);
    const whole = Number(words.match(/Whole, tailwater included (\d+\.\d)/)?.[1]);
    expect(excess / ((9.81 * 6 * 20) / 2)).toBeCloseTo(1, 1);
    expect((whole - excess) / (9.81 * 2 * 20)).toBeCloseTo(1, 2);
    expect(words).toContain('Drains and a cracked length are not in it');
  });

  it('shows no resultant for a slip surface, and a place outside the net without a figure', () => {
    const slip = profileOf({
      use: 'slipSurface',
      spacing: null,
      place: {
        on: 'section',
        points: [
          [0, 98],
          [0, 20],
        ],
      },
    });
    const words = profilesPane(withAdded(apron, slip));
    expect(words).not.toContain('Water pressure on the base');
    expect(words).toMatch(/78\.00 0\.00 20\.00 – – – –/);
  });

  it('shows 0 above the phreatic line and says so', () => {
    const borehole = profileOf({
      use: 'borehole',
      spacing: null,
      place: {
        on: 'section',
        points: [
          [0, 130],
          [0, 100],
        ],
      },
    });
    expect(profilesPane(withAdded(dam, borehole))).toMatch(
      /0\.00 0\.00 130\.00 – – 0\.0 0\.000 above the phreatic line/,
    );
  });

  it('gives no figure while the net is unfinished', () => {
    const unfinished = changed(withAdded(apron, profileOf()), 'netCount', (value) => ({
      ...value,
      drops: null,
    }));
    const words = profilesPane(unfinished);
    expect(words).toContain('The net is unfinished');
    expect(words).not.toContain('Download CSV');
  });
});

describe('a profile copied for another program', () => {
  const document = withAdded(apron, profileOf({ name: '=cmd', spacing: 5 }));
  const rows = tableTsv(profileRows(document, readNet(document).profiles[0]!))
    .split('\n')
    .map((row) => row.split('\t'));

  it('has a row for each place, its figures plain numbers, and no name that would run as a formula', () => {
    expect(rows).toHaveLength(6);
    expect(rows.map((row) => row.length)).toEqual(rows.map(() => rows[0]!.length));
    expect(rows.slice(1).map((row) => [row[0], Number(row[1])])).toEqual(
      [0, 5, 10, 15, 20].map((distance) => ["'=cmd", distance]),
    );
    for (const row of rows.slice(1)) expect(row[2]).toMatch(/^-?\d+(\.\d+)?$/);
  });
});

describe('changing profiles', () => {
  it('adds what is pasted and a grid last, under free names, as the contract wants them', () => {
    const points: [number, number][] = [
      [0, 98],
      [5, 97],
    ];
    const edit = addProfile('x', withAdded(apron, profileOf({ name: 'Profile 1', order: 4 })), {
      on: 'section',
      points,
    });
    const value = edit.ops[0]?.op === 'put' ? edit.ops[0].value : null;
    expect(value).toMatchObject({ name: 'Profile 2', order: 5, spacing: null, finished: true });
    expect(documentEntity.safeParse(value).success).toBe(true);
    expect(edit.label).toBe('pasted the places of Profile 2');
  });

  it('names each change for undo', () => {
    const profile = profileOf();
    expect([
      changeProfile('x', profile, { name: 'Toe' }).label,
      changeProfile('x', profile, { use: 'other' }).label,
      changeProfile('x', profile, { spacing: null }).label,
      removeProfile('x', 'Toe').label,
    ]).toEqual([
      'named Underside Toe',
      'said what Underside is',
      'changed the spacing of Underside',
      'removed Toe',
    ]);
  });
});

describe('exits and quantities', () => {
  const weighed = changed(apron, 'permeability', (value) => ({
    ...value,
    k: 1e-6,
    saturatedUnitWeight: 20,
  }));

  it('shows each exit with both gradients, and calls the one at the floor’s edge singular', () => {
    const words = exitsPane(weighed);
    const exits = readNet(weighed).exits;
    expect(exits.length).toBeGreaterThan(2);
    expect(words).toContain('singular');
    const critical = (20 - 9.81) / 9.81;
    expect(words).toContain(critical.toFixed(2));
  });

  it('gives no factor without the weight of the soil, and says what to enter', () => {
    const words = exitsPane(apron);
    expect(words.match(/Enter the saturated unit weight of the soil/g)).toHaveLength(1);
  });

  it('does not pass the flow of the traced channels off as the whole', () => {
    // The ground goes on below the outermost flow line traced.
    expect(exitsPane(weighed)).toContain('Traced channels only');
  });

  it('lists what books give with its source, and what was not looked up as such', () => {
    const words = exitsPane(apron);
    expect(words).toMatch(/quartz sand: 2\.64 to 2\.65 \(Venkatramaiah/);
    expect(words).toMatch(/fine gravel: 4 \(Lane \(1935\), Trans\. ASCE 100, from memory, not looked up\)/);
  });

  it('shows the seepage in the unit chosen, in the title block and as many figures as k deserves', () => {
    expect(exitsPane(weighed)).toContain('Per metre of dam, m³/s');
    const reading = readNet(weighed);
    const shown = (flowUnit: FlowUnit | null) => {
      const facts = {
        damName: '',
        section: { name: '', chainage: '' },
        drawn: '',
        checked: '',
        calculation: '',
      };
      const seepage = titleBlockCells(weighed, reading, { ...facts, flowUnit }).find(
        ({ id }) => id === 'seepage',
      );
      return seepage?.value.map((run) => (typeof run === 'string' ? run : `^${run.sup}`)).join('');
    };
    // k·Δh·Nf = 1e-6 · 0.5 · 7 = 3.5e-6 m³/s: 0.30 m³/day, 3.5e-3 L/s, 80 US gallons a day (3.785 L each).
    expect(reading.quantities.seepage).toBeCloseTo(3.5e-6, 12);
    expect(shown('m³/day')).toMatch(/^0\.3 m\^3\/day/);
    expect(shown('gal/day')).toMatch(/^80 gal\/day/);
    expect(shown('L/s')).toMatch(/^[34] × 10\^−3 L\/s/);
    expect(shown(null)).toMatch(/^[34] × 10\^−6 m\^3\/s/);
  });
});

describe('the check of the phreatic line', () => {
  it('lists each departure with its sign in the length unit, and how both ends lie', () => {
    const reading = readNet(dam);
    const words = wordsOf(
      createElement(PhreaticCheck, {
        document: dam,
        phreatic: {
          ...reading.phreatic!,
          guessed: true,
          meetings: [{ lineId: 'a', at: [1, 2], head: 112, elevation: 112.5, departure: -0.5 }],
          entry: { at: [1, 2], expected: 'square', departureDeg: 12.4 },
          exit: null,
        },
        onShow: () => {},
      }),
    );
    expect(words).toContain('Departure, m');
    expect(words).toMatch(/112\.00 , Show on the sheet 112\.50 −0\.50/);
    expect(words).toContain('Entry: square to the face; drawn 12° off.');
    expect(words).toContain('Exit: it does not reach a face.');
    expect(words).toContain('It is still a first guess.');
  });
});

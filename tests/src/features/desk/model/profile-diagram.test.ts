import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { profileDiagram } from '#client/features/desk/model/profile-diagram.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { ProfileSample } from '#shared/contract/reading-quantities.ts';

function sample(at: SheetPoint, porePressure: number | null, distance: number | null = 0): ProfileSample {
  return {
    at,
    distance,
    offset: 0,
    elevation: 0,
    status: porePressure === null ? 'withheld' : 'read',
    reason: null,
    doubtful: null,
    totalHead: null,
    totalHeadPlusMinus: null,
    pressureHead: null,
    porePressure,
    porePressurePlusMinus: null,
    ru: null,
  };
}

const level = (pressures: readonly (number | null)[]) =>
  pressures.map((pressure, i) => sample([100 * i, 50], pressure));

describe('the pressure diagram of a profile', () => {
  it('is none for a grid, for one place and where nothing was read', () => {
    expect(profileDiagram({ samples: [sample([0, 0], 5)] })).toBeNull();
    expect(profileDiagram({ samples: [sample([0, 0], 5, null), sample([9, 0], 5, null)] })).toBeNull();
    expect(profileDiagram({ samples: level([null, null]) })).toBeNull();
    expect(profileDiagram({ samples: [sample([3, 3], 5), sample([3, 3], 5)] })).toBeNull();
  });

  it('sets a trapezium off below a level base, its longest ordinate a fifth of the length', () => {
    const diagram = profileDiagram({ samples: level([10, 20, 40]) });
    expect(diagram?.curves).toEqual([
      [
        [0, 60],
        [100, 70],
        [200, 90],
      ],
    ]);
    expect(diagram?.figures.map(({ pressure, most }) => [pressure, most])).toEqual([
      [10, false],
      [40, true],
    ]);
  });

  it('lies on the same side whichever end the profile was drawn from', () => {
    const forth = level([10, 20, 40]);
    const curve = profileDiagram({ samples: forth })?.curves[0];
    expect(profileDiagram({ samples: [...forth].reverse() })?.curves[0]).toEqual([...curve!].reverse());
  });

  it('stands to the right of a borehole', () => {
    const samples = [0, 50, 100].map((y) => sample([500, y], y));
    expect(profileDiagram({ samples })?.curves[0]?.map(([x]) => x)).toEqual([500, 510, 520]);
  });

  it('puts a pressure below zero on the other side, and one of zero on the profile', () => {
    const [curve] = profileDiagram({ samples: level([-20, 0, 40]) })?.curves ?? [];
    expect(curve?.map(([, y]) => y - 50)).toEqual([-20, 0, 40]);
  });

  it('has a gap where nothing was read', () => {
    const diagram = profileDiagram({ samples: level([1, 2, null, 2, 1, null, 3]) });
    expect(diagram?.curves.map((curve) => curve.length)).toEqual([2, 2]);
  });

  it('is finite for a pressure near nothing', () => {
    const diagram = profileDiagram({ samples: [sample([0, 0], 5e-324), sample([100, 0], 0)] });
    expect(diagram!.curves.flat(2).every(Number.isFinite)).toBe(true);
  });

  it('is finite and no ordinate is longer than a fifth of the profile, however it bends', () => {
    const px = fc.double({ min: -5000, max: 5000, noNaN: true });
    const places = fc.array(fc.tuple(px, px, fc.double({ min: -500, max: 500, noNaN: true })), {
      minLength: 2,
      maxLength: 30,
    });
    fc.assert(
      fc.property(places, (drawn) => {
        const samples = drawn.map(([x, y, u]) => sample([x, y], u));
        const diagram = profileDiagram({ samples });
        if (diagram === null) return;
        const length = samples
          .slice(1)
          .reduce(
            (sum, { at }, i) => sum + Math.hypot(at[0] - samples[i]!.at[0], at[1] - samples[i]!.at[1]),
            0,
          );
        diagram.curves[0]!.forEach(([x, y], i) => {
          const [ax, ay] = samples[i]!.at;
          expect(Math.hypot(x - ax, y - ay)).toBeLessThanOrEqual(0.2 * length * (1 + 1e-9) + 1e-9);
        });
      }),
    );
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  backwards,
  refracted,
  refractionOfFlow,
  refractionOfHeads,
  sensitivityOf,
} from '#shared/compute/soils/refraction.ts';
import type { Tensor } from '#shared/compute/soils/soil-list.ts';
import { PUBLISHED } from '#tests/support/published-checks.ts';

const isotropic = (k: number): Tensor => ({ xx: k, xy: 0, yy: k });
const degrees = (angle: number) => (angle * 180) / Math.PI;
const radians = (angle: number) => (angle * Math.PI) / 180;

const angle = fc.double({ min: -1.3, max: 1.3, noNaN: true });
const conductivity = fc.double({ min: 0.1, max: 10, noNaN: true });
const tensor = fc.tuple(conductivity, conductivity, angle).map(([k, kv, turn]): Tensor => {
  const [c, s] = [Math.cos(turn), Math.sin(turn)];
  return { xx: k * c * c + kv * s * s, xy: (k - kv) * c * s, yy: k * s * s + kv * c * c };
});

/** Flow −K∇h. */
const flowOf = ({ xx, xy, yy }: Tensor, [gx, gy]: readonly [number, number]) =>
  [-(xx * gx + xy * gy), -(xy * gx + yy * gy)] as const;

describe('refraction at the boundary of two soils', () => {
  it.each([
    ['3-05', 1e-5, 1e-6, 60],
    ['3-06', 1e-6, 1e-5, 30],
    ['3-07', 2e-4, 5e-5, 45],
  ] as const)('turns flow lines as published (check %s, Harr 1962)', (id, k1, k2, alpha1) => {
    const law = refractionOfFlow(isotropic(k1), isotropic(k2), [Math.SQRT1_2, Math.SQRT1_2]);
    expect(degrees(refracted(law, radians(alpha1)))).toBeCloseTo(PUBLISHED[id].alpha2, 6);
    // Equipotentials obey the same law measured from the boundary, and stay square to the flow lines.
    const heads = refractionOfHeads(isotropic(k1), isotropic(k2), [Math.SQRT1_2, Math.SQRT1_2]);
    expect(degrees(refracted(heads, radians(alpha1 - 90)))).toBeCloseTo(PUBLISHED[id].alpha2 - 90, 6);
  });

  it('keeps the head along the boundary and the flow across it one on both sides, whatever the tensors', () => {
    fc.assert(
      fc.property(tensor, tensor, angle, angle, (k1, k2, turn, slope) => {
        const tangent = [Math.cos(turn), Math.sin(turn)] as const;
        const normal = [-tangent[1], tangent[0]] as const;
        const along = Math.cos(slope);
        const across = Math.sin(slope);
        const nn = ({ xx, xy, yy }: Tensor) =>
          xx * normal[0] ** 2 + 2 * xy * normal[0] * normal[1] + yy * normal[1] ** 2;
        const nt = ({ xx, xy, yy }: Tensor) =>
          xx * normal[0] * tangent[0] +
          xy * (normal[0] * tangent[1] + normal[1] * tangent[0]) +
          yy * normal[1] * tangent[1];
        const past = (nn(k1) * across + (nt(k1) - nt(k2)) * along) / nn(k2);
        const gradient = (n: number) =>
          [n * normal[0] + along * tangent[0], n * normal[1] + along * tangent[1]] as const;
        const angleOf = ([x, y]: readonly [number, number]) =>
          Math.atan((x * tangent[0] + y * tangent[1]) / (x * normal[0] + y * normal[1]));
        const [q1, q2] = [flowOf(k1, gradient(across)), flowOf(k2, gradient(past))];
        fc.pre(Math.abs(q1[0] * normal[0] + q1[1] * normal[1]) > 0.01 && Math.abs(along) > 0.01);
        const law = refractionOfFlow(k1, k2, tangent);
        expect(refracted(law, angleOf(q1))).toBeCloseTo(angleOf(q2), 6);
        expect(refracted(backwards(law), angleOf(q2))).toBeCloseTo(angleOf(q1), 6);
        const square = ([x, y]: readonly [number, number]) => [-y, x] as const;
        const heads = refractionOfHeads(k1, k2, tangent);
        expect(refracted(heads, angleOf(square(gradient(across))))).toBeCloseTo(
          angleOf(square(gradient(past))),
          6,
        );
      }),
    );
  });

  it('knows by how much an error before it turns the direction past it', () => {
    fc.assert(
      fc.property(tensor, tensor, angle, (k1, k2, alpha) => {
        const law = refractionOfFlow(k1, k2, [1, 0]);
        const step = 1e-6;
        const turned = (refracted(law, alpha + step) - refracted(law, alpha - step)) / (2 * step);
        expect(Math.abs(sensitivityOf(law, alpha) - turned)).toBeLessThan(1e-4 * (1 + Math.abs(turned)));
      }),
    );
  });
});

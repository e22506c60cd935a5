/** Student's t that holds 95 % between −t and +t, for 1, 2, 3 … degrees of freedom. */
const STUDENT_95 = [
  12.706, 4.303, 3.182, 2.776, 2.571, 2.447, 2.365, 2.306, 2.262, 2.228, 2.201, 2.179, 2.16, 2.145, 2.131,
];
const NORMAL_95 = 1.96;

/**
 * Factor by which a standard deviation estimated with so many degrees of freedom is multiplied to hold 95 %. Beyond the
 * table t = z + (z³ + z)/(4ν) + (5z⁵ + 16z³ + 3z)/(96ν²), z = 1.960. Infinite without a degree of freedom. Source: JCGM 100 (2008), table G.2;
 * for many degrees of freedom Abramowitz and Stegun (1964), 26.7.5.
 */
export function coverageFactor(degreesOfFreedom: number): number {
  if (degreesOfFreedom < 1) return Number.POSITIVE_INFINITY;
  const whole = Math.floor(degreesOfFreedom);
  const z = NORMAL_95;
  const first = (z ** 3 + z) / (4 * whole);
  const second = (5 * z ** 5 + 16 * z ** 3 + 3 * z) / (96 * whole ** 2);
  return STUDENT_95[whole - 1] ?? z + first + second;
}

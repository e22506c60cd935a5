/**
 * Chance that a standard normal variable lies beyond ±z, z ≥ 0. Absolute error below 1.5·10⁻⁷. Source: Abramowitz and
 * Stegun (1964), 7.1.26.
 */
export function normalTail(z: number): number {
  const x = z / Math.SQRT2;
  const t = 1 / (1 + 0.3275911 * x);
  const series =
    t * (0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429))));
  return series * Math.exp(-x * x);
}

/**
 * Chance that Student's t with ν degrees of freedom lies beyond ±t, t ≥ 0, ν a whole number of at least 1; 0 for an
 * infinite t. Source: Abramowitz and Stegun (1964), 26.7.3 and 26.7.4, finite series in θ = arctan(t/√ν).
 */
export function studentTail(t: number, nu: number): number {
  const theta = Math.atan(t / Math.sqrt(nu));
  const [cos, sin] = [Math.cos(theta), Math.sin(theta)];
  const isOdd = nu % 2 === 1;
  if (nu === 1) return 1 - (2 * theta) / Math.PI;
  let term = isOdd ? cos : 1;
  let sum = term;
  for (let k = isOdd ? 3 : 2; k <= nu - 2; k += 2) {
    term *= ((k - 1) / k) * cos * cos;
    sum += term;
  }
  const within = isOdd ? (2 / Math.PI) * (theta + sin * sum) : sin * sum;
  return Math.max(0, 1 - within);
}

import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';

/**
 * Check values from outside the project, copied from the shared list of published checks (case ids as there). Where
 * that list lies beside the checkout, a test compares the copies with it; elsewhere the copies stand alone.
 */
export const PUBLISHED = {
  '7-01': {
    source: 'own arithmetic, complex algebra',
    scale: 0.0249951955,
    rotation: -1.12330271,
    probe_x: 27.3904497,
    probe_z: 109.712932,
  },
  '7-02': {
    source: 'own arithmetic, numpy lstsq and centroid formula',
    a: 0.0499823505,
    b: -2.19771625e-5,
    rms_per_point: 0.0240474183,
    max_point_residual: 0.0335014077,
  },
  '7-04': {
    source: 'Ghilani and Wolf, Adjustment Computations, ch. 18',
    a: -4.51249,
    b: -0.25371,
    scale: 4.51962,
    vX1: 0.004,
    vY1: -0.029,
    vX2: 0.101,
    vY2: -0.077,
    vX3: -0.105,
    vY3: 0.106,
  },
  '7-05': { source: 'own arithmetic', area: 2000, area_reversed_order: -2000 },
  '7-06': { source: 'own arithmetic', x: 4.75609756, y: 1.90243902 },
  '1A-06': {
    source: 'Harr 1962',
    h_over_H_y1: 0.0640942168,
    'h_over_H_y2.5': 0.166666667,
    h_over_H_y4: 0.295167235,
  },
  '1A-07': {
    source: 'Harr 1962',
    q_over_kH: 0.4,
    outer_flow_line_half_width: 8.0724402,
    outer_flow_line_depth: 9.49548792,
    node_i3_j2_x: 1.97050303,
    node_i3_j2_depth: 4.87016941,
  },
  '1A-08': {
    source: 'Harr 1962',
    q_over_kH: 0.583333333,
    outer_flow_line_half_width: 32.0504339,
    outer_flow_line_depth: 30.4504567,
    node_i4_j3_x: 6.62304545,
    node_i4_j3_depth: 7.5229112,
  },
  '1A-12': {
    source: 'Harr 1962',
    'h_over_H_x-8': 0.795167235,
    'h_over_H_x-5': 0.666666667,
    h_over_H_x0: 0.5,
    h_over_H_x5: 0.333333333,
    h_over_H_x8: 0.204832765,
  },
  '1B-08': { source: 'Khosla, Bose and Taylor 1936; by hand', head: 102.58, u: 59.6448 },
  '2-01': {
    source: 'Kozeny 1931',
    S: 1.76122604,
    y_at_x0: 1.76122604,
    y_at_x20: 8.57618555,
    h_on_base_x20: 8.39339272,
  },
  '3-01': {
    source: 'Harr 1962',
    x_factor: 0.333333333,
    k_equivalent: 3e-6,
    shape_factor: 0.44924624,
    q: 6.7386936e-6,
  },
  '3-02': {
    source: 'Harr 1962',
    x_factor: 0.5,
    k_equivalent: 2e-6,
    shape_factor: 0.533179557,
    q: 5.33179557e-6,
  },
  '3-03': {
    source: 'Harr 1962',
    x_factor: 0.333333333,
    k_equivalent: 3e-6,
    shape_factor: 0.5,
    q: 7.5e-6,
  },
  '3-04': { source: 'Das, Principles of Geotechnical Engineering', q: 50.12 },
  '3-05': { source: 'Harr 1962', alpha2: 9.82642982 },
  '3-06': { source: 'Harr 1962', alpha2: 80.1735702 },
  '3-07': { source: 'Harr 1962', alpha2: 14.0362435 },
  '5-10': { source: 'exact definitions', '62.4 lbf/ft3 in kN/m3': 9.802258 },
  '5-16': { source: 'exact definitions', kPa: 0.047880259 },
  '5-18': { source: 'exact definitions', 'kN/m3': 0.157087464 },
  '5-19': { source: 'exact definitions', 'm/s': 0.01 },
  '5-20': { source: 'exact definitions', 'm/s': 3.52777778e-6 },
  '5-21': { source: 'exact definitions', 'm/s': 0.00508 },
  '5-29': { source: 'exact definitions', 'm/s': 1.15740741e-5 },
  '8-01': { source: 'Das, Ex. 8.2', rise_a: 5.043, rise_b: 2.777, q: 6.74333333e-5 },
  '8-02': { source: 'Venkatramaiah, Geotechnical Engineering', q: 0.0002143 },
  '8-06': { source: "Craig's Soil Mechanics", q: 2.15e-5, head_after_2_of_12_drops: 3.33333333 },
  '8-07': { source: 'exact definitions', q_ft3: 14.3181818, q_si: 1.53958636e-5 },
} as const;

type SharedCase = { id: string; expected: Record<string, { value: number }> };

/** The shared list beside the checkout, or null where it is absent. */
export function sharedChecks(): SharedCase[] | null {
  const file = path.resolve(import.meta.dirname, '..', '..', '..', 'shared', 'checks', 'published.json');
  if (!existsSync(file)) return null;
  return (JSON.parse(readFileSync(file, 'utf8')) as { cases: SharedCase[] }).cases;
}

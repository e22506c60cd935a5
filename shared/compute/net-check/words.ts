import type { CheckedMeeting } from '#shared/contract/reading-net-check.ts';

/** Whole degrees, as the title block and the findings give angles. */
export function degrees(angleDeg: number): string {
  return `${Math.round(angleDeg)}°`;
}

/** Two decimals, closing zeros left out. */
export function ratioText(ratio: number): string {
  return String(Math.round(100 * ratio) / 100);
}

/** What the cells of a net should be: square, of a B/L, or without channels alike. */
export function shapeText(judgedBy: number, hasChannels: boolean): string {
  if (!hasChannels) return 'alike';
  return Math.abs(judgedBy - 1) < 0.005 ? 'square' : `of B/L ${ratioText(judgedBy)}`;
}

export function counted(count: number, one: string, many: string): string {
  return `${count} ${count === 1 ? one : many}`;
}

const MEETINGS: Record<CheckedMeeting['kind'], string> = {
  crossing: 'An equipotential crosses a flow line',
  equipotentialAtImpervious: 'An equipotential meets an impervious boundary',
  equipotentialAtPhreatic: 'An equipotential meets the phreatic line',
  flowLineAtPotential: 'A flow line meets the boundary where the water enters or leaves',
};

/** A meeting in words, at the head of a sentence: "An equipotential crosses a flow line". */
export function meetingText(kind: CheckedMeeting['kind']): string {
  return MEETINGS[kind];
}

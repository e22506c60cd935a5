import { describe, expect, it } from 'vitest';
import { piecesIn } from '#shared/compute/geometry/clip-line.ts';

const frame = [0, 0, 100, 100] as const;

describe('clipping a line to what is seen', () => {
  it('gives nothing for a line that is out of sight', () => {
    expect(
      piecesIn(
        [
          [-50, -10],
          [150, -10],
        ],
        frame,
      ),
    ).toEqual([]);
    expect(piecesIn([[5, 5]], frame)).toEqual([]);
  });

  it('keeps a line that lies inside whole', () => {
    expect(
      piecesIn(
        [
          [10, 10],
          [50, 50],
          [90, 10],
        ],
        frame,
      ),
    ).toEqual([
      {
        points: [
          [10, 10],
          [50, 50],
          [90, 10],
        ],
        start: 0,
      },
    ]);
  });

  it('cuts a line where it leaves and begins again where it returns, with its distance along the whole', () => {
    const pieces = piecesIn(
      [
        [50, 50],
        [150, 50],
        [150, 80],
        [50, 80],
      ],
      frame,
    );
    expect(pieces).toEqual([
      {
        points: [
          [50, 50],
          [100, 50],
        ],
        start: 0,
      },
      {
        points: [
          [100, 80],
          [50, 80],
        ],
        start: 100 + 30 + 50,
      },
    ]);
  });
});

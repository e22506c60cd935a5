import type { NetReading, SetOutReading } from '#shared/contract/reading.ts';

/** A reading that tells the calibration and nothing of the net, as who reads blind sees it. */
export function blankReading(setOut: SetOutReading): NetReading {
  return {
    state: 'unfinished',
    findings: [],
    setOut,
    lines: [],
    points: [],
    measured: [],
    quantities: {
      drops: null,
      tracedDrops: null,
      channels: null,
      shapeFactor: null,
      channelsComplete: false,
      headLost: null,
      headPerDrop: null,
      unequalIntervals: false,
      seepage: null,
      seepageFigures: 2,
      gammaW: null,
      outlets: [],
    },
    frame: null,
    soils: null,
    phreatic: null,
    netCheck: null,
    doubt: { headLost: null, headPerDrop: null, seepageFactor: null, seepageShares: [] },
    profiles: [],
    exits: [],
    stability: { heave: [], creep: null },
  };
}

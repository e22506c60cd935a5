import { makeFinding } from '#shared/compute/findings.ts';
import type { ChannelCount } from '#shared/compute/net/channels.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import { figuresOf, kPerSecondOf, seepagePerRun } from '#shared/compute/net/seepage.ts';
import type { SingleInputs } from '#shared/compute/single-inputs.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import type { Finding, NetReading } from '#shared/contract/reading.ts';

type Quantities = NetReading['quantities'];

/**
 * The quantities of the net: drops, channels, head lost and per drop, seepage per run of dam. Lengths in the document's
 * unit, seepage in m³/s per m or ft³/s per ft. What cannot be given is null: everything that hangs on the count while
 * the count does not stand, head per drop and seepage where the intervals are unequal.
 */
export function quantitiesOf(
  heads: NetHeads | null,
  channels: ChannelCount | null,
  inputs: SingleInputs,
  system: UnitSystem,
): { quantities: Quantities; findings: Finding[] } {
  const count = heads?.count ?? null;
  const stands = count !== null && count.headPerDrop !== null && count.findings.length === 0;
  const drops = stands ? inputs.count.drops : null;
  const headLost =
    heads?.headwater == null || heads.outHead === null ? null : finiteOrNull(heads.headwater - heads.outHead);
  const nf = inputs.count.channels ?? channels?.counted ?? null;
  const equal = stands && !count.unequal;
  const k = kPerSecondOf(inputs.permeability, system);
  const seepage =
    equal && k !== null && nf !== null && drops !== null && headLost !== null
      ? finiteOrNull(seepagePerRun(k, headLost, nf, drops, inputs.count.cellRatio))
      : null;
  return {
    quantities: {
      drops,
      tracedDrops: count?.tracedDrops ?? null,
      channels: nf,
      // A count that is stated beside no flow line at all is the engineer's, of the whole flow.
      channelsComplete: channels?.counted == null ? nf !== null : channels.complete,
      headLost,
      headPerDrop: equal ? finiteOrNull(count.headPerDrop ?? Number.NaN) : null,
      unequalIntervals: count?.unequal ?? false,
      seepage,
      seepageFigures: figuresOf(inputs.permeability),
      gammaW: inputs.water.gammaW,
    },
    findings: quantityFindings(channels, inputs, stands && count.unequal),
  };
}

function quantityFindings(channels: ChannelCount | null, inputs: SingleInputs, unequal: boolean): Finding[] {
  const findings: Finding[] = [];
  const counted = channels?.counted ?? null;
  const stated = inputs.count.channels;
  if (counted === null && stated === null) {
    findings.push(
      makeFinding(
        'note',
        'channelsMissing',
        'No flow line is traced and no count of channels is stated, so that no seepage is given.',
        {
          cell: 'channels',
        },
      ),
    );
  } else if (counted !== null && stated !== null && Math.ceil(stated - 0.05) !== counted) {
    findings.push(
      makeFinding(
        'question',
        'channelsDiffer',
        `${stated} channels are stated, the traced lines make ${counted}. Check the count or the flow lines.`,
        {
          cell: 'channels',
        },
      ),
    );
  }
  if (counted !== null && !channels!.complete) {
    findings.push(
      makeFinding(
        'note',
        'tracedChannelsOnly',
        'An outermost flow line is no traced boundary: the channels and the seepage are of the traced channels only.',
        {
          cell: 'channels',
        },
      ),
    );
  }
  if (unequal) {
    findings.push(
      makeFinding(
        'note',
        'unequalIntervals',
        'The lines part the head unequally: there is no single head per drop, and no seepage from the count.',
        {
          cell: 'headPerDrop',
        },
      ),
    );
  }
  return findings;
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}

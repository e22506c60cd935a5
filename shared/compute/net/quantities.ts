import { makeFinding } from '#shared/compute/findings.ts';
import type { ChannelCount } from '#shared/compute/net/channels.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import type { FlowOrder } from '#shared/compute/net/order.ts';
import { channelsInto } from '#shared/compute/net/outlet-flows.ts';
import type { Potential } from '#shared/compute/net/potentials.ts';
import { figuresOf, kPerSecondOf, seepagePerRun } from '#shared/compute/net/seepage.ts';
import type { SingleInputs } from '#shared/compute/single-inputs.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import type { Finding, NetReading } from '#shared/contract/reading.ts';

type Quantities = NetReading['quantities'];

/** A net in order, counted; null while there is none. */
export type CountedNet = {
  readonly order: FlowOrder;
  readonly heads: NetHeads;
  readonly channels: ChannelCount;
};

/**
 * The quantities of the net: drops, channels, shape factor Nf/Nd, head lost and per drop, seepage per run of dam, and
 * each outlet's own share. Lengths in the document's unit, seepage in m³/s per m or ft³/s per ft. What cannot be given is
 * null: everything that hangs on the count while the count does not stand, head per drop and seepage where the intervals
 * are unequal, and the single count of drops where the outlets lie at different heads: each outlet has its own.
 */
export function quantitiesOf(
  net: CountedNet | null,
  inputs: SingleInputs,
  system: UnitSystem,
): { quantities: Quantities; findings: Finding[] } {
  const heads = net?.heads ?? null;
  const channels = net?.channels ?? null;
  const count = heads?.count ?? null;
  const stands = count !== null && count.headPerDrop !== null && heads?.findings.length === 0;
  const statedDrops = stands ? inputs.count.drops : null;
  const drops = heads?.several ? null : statedDrops;
  const headLost =
    heads?.headwater == null || heads.outHead === null ? null : finiteOrNull(heads.headwater - heads.outHead);
  const nf = inputs.count.channels ?? channels?.counted ?? null;
  const equal = stands && !count.unequal;
  const k = kPerSecondOf(inputs.permeability, system);
  const seepage =
    equal && k !== null && nf !== null && statedDrops !== null && headLost !== null
      ? finiteOrNull(seepagePerRun(k, headLost, nf, statedDrops, inputs.count.cellRatio))
      : null;
  return {
    quantities: {
      drops,
      tracedDrops: count?.tracedDrops ?? null,
      channels: nf,
      shapeFactor: equal && drops !== null && nf !== null ? finiteOrNull(nf / drops) : null,
      // A count that is stated beside no flow line at all is the engineer's, of the whole flow.
      channelsComplete: channels?.counted == null ? nf !== null : channels.complete,
      headLost,
      headPerDrop: equal ? finiteOrNull(count.headPerDrop ?? Number.NaN) : null,
      unequalIntervals: count?.unequal ?? false,
      seepage,
      seepageFigures: figuresOf(inputs.permeability),
      gammaW: inputs.water.gammaW,
      outlets:
        net !== null && stands ? net.heads.outlets.map((outlet) => outletOf(outlet, net, inputs, k)) : [],
    },
    findings: quantityFindings(channels, inputs, stands && count.unequal),
  };
}

function outletOf(
  { id, members, label, outHead }: Potential,
  { order, heads, channels }: CountedNet,
  inputs: SingleInputs,
  k: number | null,
): Quantities['outlets'][number] {
  const single = heads.outlets.length === 1;
  const into = single
    ? (inputs.count.channels ?? channels.counted)
    : channelsInto(id, order, channels, heads, inputs.count.channels);
  const headPerDrop = heads.count?.unequal === false ? heads.count.headPerDrop : null;
  const seepage =
    k === null || into === null || headPerDrop === null
      ? null
      : finiteOrNull(seepagePerRun(k, headPerDrop, into, 1, inputs.count.cellRatio));
  return {
    id,
    members: [...members],
    label,
    head: outHead,
    headLost: heads.headwater === null ? null : finiteOrNull(heads.headwater - outHead),
    drops: finiteOrNull(heads.byId.get(id)?.drops ?? Number.NaN),
    channels: into,
    seepage,
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

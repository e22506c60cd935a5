import type { NetCells } from '#shared/compute/cells/cells.ts';
import type { CellChannel } from '#shared/compute/cells/channels.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { NetCheckReading } from '#shared/contract/reading-net-check.ts';

type FlowInputs = {
  readonly cells: NetCells;
  readonly enteredRatio: number;
  readonly quantities: Pick<NetReading['quantities'], 'seepage' | 'channels'>;
};

/** A channel of which fewer than this part of the strips have a judged cell is not measured. */
const LEAST_PART = 0.5;

/** Counts of channels that differ by less are one. */
const SAME_COUNT = 1;

/**
 * Seepage by the cells as they are drawn: Nf·(B/L) is the sum of the channels' flows Σ(ΣΔNd / Σ(L/B)), each channel
 * taken as resistances one behind the other, and q = k·Δh·Nf·(B/L) follows from the stated q by that sum over the stated
 * Nf·(B/L); units as the stated seepage. Null where a channel could not be measured or the channels measured are not
 * those counted. Source: Forchheimer's flow net, as in Casagrande (1937).
 */
export function measuredFlowOf(
  { cells, enteredRatio, quantities }: FlowInputs,
  channels: readonly CellChannel[],
): Pick<NetCheckReading, 'measuredFlow' | 'measuredSeepage'> {
  const strips = cells.rails.filter(({ rails }) => rails.length > 1).length;
  const whole = channels.every(
    (channel) =>
      channel.cells.filter((cell) => cell.notJudged === null).length >= LEAST_PART * strips &&
      channel.flow !== null,
  );
  if (!whole || channels.length === 0) return { measuredFlow: null, measuredSeepage: null };
  const measuredFlow = channels.reduce((sum, channel) => sum + (channel.flow ?? 0), 0);
  const { seepage, channels: counted } = quantities;
  const comparable = seepage !== null && counted !== null && Math.abs(channels.length - counted) < SAME_COUNT;
  const measuredSeepage = comparable ? (seepage * measuredFlow) / (counted * enteredRatio) : Number.NaN;
  return { measuredFlow, measuredSeepage: Number.isFinite(measuredSeepage) ? measuredSeepage : null };
}

import { powerRuns } from '#client/features/desk/components/figure-runs.ts';
import { Runs } from '#client/features/desk/components/runs.tsx';
import { type FlowUnit, flowIn } from '#shared/compute/quantities/seepage-volume.ts';

/** A flow in m³/s, shown in a unit with as many figures as its permeability deserves. */
export function FlowFigure({ flow, figures, unit }: { flow: number; figures: number; unit: FlowUnit }) {
  return <Runs runs={powerRuns(flowIn(unit, flow, 'SI'), figures)} />;
}

import { useStore } from 'zustand';
import type { CrosshairStore } from '../model/crosshair.ts';
import type { ViewStore } from '../model/view-store.ts';
import { toScreen } from '../model/viewport.ts';

const ARM_PX = 22;
const GAP_PX = 4;
const SIDE_PX = 2 * ARM_PX + 1;
const MIDDLE = ARM_PX + 0.5;
const CROSS = [
  `M${MIDDLE} 0V${MIDDLE - GAP_PX}`,
  `M${MIDDLE} ${MIDDLE + GAP_PX}V${SIDE_PX}`,
  `M0 ${MIDDLE}H${MIDDLE - GAP_PX}`,
  `M${MIDDLE + GAP_PX} ${MIDDLE}H${SIDE_PX}`,
].join('');
const HELD = `M${MIDDLE - 7} ${MIDDLE - 7}h14v14h-14z`;

/** The crosshair moved by keys: ink with a halo, so that it is seen on paper, on lines and on an inverted scan. */
export function CrosshairMark({ crosshair, views }: { crosshair: CrosshairStore; views: ViewStore }) {
  const at = useStore(crosshair, (state) => state.at);
  const holds = useStore(crosshair, (state) => state.holds);
  const view = useStore(views, (state) => state.view);
  if (at === null) return null;
  const [x, y] = toScreen(view, at);
  const path = holds ? CROSS + HELD : CROSS;
  return (
    <svg
      aria-hidden="true"
      data-crosshair={holds ? 'holds' : 'free'}
      width={SIDE_PX}
      height={SIDE_PX}
      className="pointer-events-none absolute top-0 left-0"
      style={{ transform: `translate(${x - MIDDLE}px, ${y - MIDDLE}px)` }}
    >
      <path d={path} fill="none" stroke="var(--color-film)" strokeWidth="4" strokeOpacity="0.9" />
      <path d={path} fill="none" stroke="var(--color-ink)" strokeWidth="1.5" />
      <circle cx={MIDDLE} cy={MIDDLE} r="1" fill="var(--color-ink)" />
    </svg>
  );
}

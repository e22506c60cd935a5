import { placingText as text } from '#client/text/set-out.ts';
import type { EntityOf, FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { NeededFigure } from './form-fields.tsx';
import { extentOf, withTyped } from './typed-place.ts';

const AXES = [0, 1] as const;

/** The place itself, which can be typed to a tenth of a pixel. */
export function PlaceOnSheet({
  at,
  sheet,
  disabled,
  onCommit,
}: {
  at: SheetPoint;
  sheet: FlowNetDocument['sheet'];
  disabled: boolean;
  onCommit: (at: SheetPoint) => void;
}) {
  return (
    <details className="mt-1 text-sm">
      <summary className="cursor-pointer text-ink-2 tabular-nums">{text.place(at[0], at[1])}</summary>
      <div className="mt-1 grid grid-cols-2 gap-2">
        {AXES.map((axis) => (
          <NeededFigure
            key={axis}
            label={axis === 0 ? text.across : text.down}
            value={at[axis]}
            within={extentOf(sheet, axis)}
            disabled={disabled}
            onCommit={(px) => onCommit(withTyped(at, axis, px))}
          />
        ))}
      </div>
    </details>
  );
}

/** What a point gives, where that is not both: a point of one figure is told from one that is not finished. */
export function GivenByPoint({
  value: { offset, elevation },
  method,
  isBarEnd,
}: {
  value: EntityOf<'knownPoint'>;
  method: EntityOf<'setOut'>['method'];
  isBarEnd: boolean;
}) {
  if (offset !== null && elevation !== null) return null;
  const isBlank = offset === null && elevation === null;
  // By a distance a point may give neither: it is an end of the length.
  if (method === 'distance') return null;
  const isUnfinished = isBlank && !isBarEnd;
  const words = isUnfinished
    ? text.unfinished
    : isBlank
      ? text.scaleBarEnd
      : offset === null
        ? text.elevationOnly
        : text.offsetOnly;
  return <p className={`m-0 mt-1 text-sm ${isUnfinished ? 'text-attention' : 'text-ink-2'}`}>{words}</p>;
}

/** A fit that needs every figure meets them all, whatever was typed: then there is nothing to show. */
export function Residual({ id, reading, unit }: { id: string; reading: NetReading | null; unit: string }) {
  const residual = reading?.setOut.residuals.find((each) => each.id === id);
  if (!residual || reading === null || reading.setOut.residual === null) return null;
  const { unitsPerPx, unitsPerPxUp } = reading.setOut;
  const isSuspect = reading.findings.some(
    ({ code, entityIds }) => code === 'knownPointSuspect' && entityIds.includes(id),
  );
  const parts = (['offset', 'elevation'] as const).flatMap((axis) => {
    const off = residual[axis];
    const perPx = axis === 'offset' ? unitsPerPx : (unitsPerPxUp ?? unitsPerPx);
    return off === null || perPx === null ? [] : [text.residualOf(axis, off, unit, off / perPx)];
  });
  return (
    <>
      {parts.length > 0 && <p className="m-0 mt-1 text-sm text-ink-2 tabular-nums">{text.offBy(parts)}</p>}
      {isSuspect && <p className="m-0 mt-1 text-sm font-semibold text-attention">{text.suspect}</p>}
    </>
  );
}

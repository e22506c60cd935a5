/** How far something is, 0 to 1; null when that is not known. */
export function ProgressBar({ label, value }: { label: string; value: number | null }) {
  const percent = value === null ? null : Math.round(Math.min(1, Math.max(0, value)) * 100);
  return (
    <div
      role="progressbar"
      aria-label={label}
      aria-valuemin={0}
      aria-valuemax={100}
      aria-valuenow={percent ?? undefined}
      className="h-1.5 w-full border border-ink-2 bg-white"
    >
      <div className="h-full bg-equipotential" style={{ width: `${percent ?? 0}%` }} />
    </div>
  );
}

/** A piece of a figure: plain text, or a power raised by markup. */
export type Run = string | { readonly sup: string };

/** A figure with its powers raised. */
export function Runs({ runs }: { runs: readonly Run[] }) {
  return runs.map((run, index) =>
    typeof run === 'string' ? (
      // biome-ignore lint/suspicious/noArrayIndexKey: the pieces of one figure never move
      <span key={index}>{run}</span>
    ) : (
      // biome-ignore lint/suspicious/noArrayIndexKey: the pieces of one figure never move
      <sup key={index}>{run.sup}</sup>
    ),
  );
}

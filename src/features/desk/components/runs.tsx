import { createElement, Fragment } from 'react';

/** A piece of a figure: plain text, or a power raised by markup. */
export type Run = string | { readonly sup: string };

/** A figure with its powers raised. The pieces are given as separate children: they never move, so need no keys. */
export function Runs({ runs }: { runs: readonly Run[] }) {
  const pieces = runs.map((run) =>
    typeof run === 'string' ? createElement('span', null, run) : createElement('sup', null, run.sup),
  );
  return createElement(Fragment, null, ...pieces);
}

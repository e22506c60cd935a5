import { commonText } from '#client/text/common.ts';

/** A plain word, and only when waiting has become noticeable. */
export function Loading() {
  return (
    <p role="status" className="shown-late m-0 p-4 text-ink-2">
      {commonText.loading}
    </p>
  );
}

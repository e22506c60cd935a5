import { apiUrl } from '#client/lib/http.ts';

/** A sheet in small; the paper alone until there is one. Decorative: the name stands beside it. */
export function Thumbnail({ sheetId, className }: { sheetId: string | undefined; className: string }) {
  if (sheetId === undefined) return <div className={className} />;
  return (
    <img
      src={apiUrl(`/sheets/${sheetId}/thumbnail`)}
      alt=""
      loading="lazy"
      decoding="async"
      className={`${className} object-contain`}
    />
  );
}

import { apiUrl } from '#client/lib/http.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';

/** A sheet in small; the paper alone until there is one. Decorative: the name stands beside it. */
export function Thumbnail({ sheet, className }: { sheet: SheetDto | undefined; className: string }) {
  if (sheet === undefined) return <div className={className} />;
  // Browsers keep it for ever: another picture of the sheet needs another address.
  const picture = sheet.shown ? `?picture=${sheet.shown.id}` : '';
  return (
    <img
      src={apiUrl(`/sheets/${sheet.id}/thumbnail${picture}`)}
      alt=""
      loading="lazy"
      decoding="async"
      className={`${className} object-contain`}
    />
  );
}

import { Link } from 'react-router-dom';
import { drawingsText as text } from '#client/text/drawings.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import { Thumbnail } from './thumbnail.tsx';

/** The pages of a file in small; the chosen one is in the address. */
export function PagePicker({ sheets, chosen }: { sheets: readonly SheetDto[]; chosen: SheetDto }) {
  if (sheets.length < 2) return null;
  return (
    <nav aria-label={text.choosePage} className="border-b border-rule">
      <ul className="m-0 flex list-none gap-2 overflow-x-auto p-2.5">
        {sheets.map((sheet) => (
          <li key={sheet.id} className="shrink-0">
            <Link
              to={`?sheet=${sheet.pageNumber}`}
              replace
              aria-current={sheet.id === chosen.id ? 'page' : undefined}
              className="block w-[7rem] border border-rule bg-white p-1 text-center text-sm no-underline aria-[current]:border-ink aria-[current]:bg-chosen aria-[current]:font-semibold"
            >
              <Thumbnail sheet={sheet} className="h-[72px] w-full" />
              {text.sheet(sheet.pageNumber)}
            </Link>
          </li>
        ))}
      </ul>
    </nav>
  );
}

import { Link } from 'react-router-dom';
import { Cell } from '#client/components/table.tsx';
import { formatAgo, formatMoment } from '#client/lib/dates.ts';
import { apiUrl } from '#client/lib/http.ts';
import { shortName } from '#client/lib/initials.ts';
import { paths } from '#client/lib/paths.ts';
import { drawingName } from '#client/text/drawings.ts';
import { registerStateText, registerText as text } from '#client/text/register.ts';
import type { RegisterRow } from '#shared/contract/register.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { ROW_LINK } from './use-row-keys.ts';

/** On a telephone: the picture at the left, the words below each other beside it. */
const ROW =
  'hover:bg-hover align-top max-sm:grid max-sm:grid-cols-[80px_minmax(0,1fr)] max-sm:border-b max-sm:border-rule-2 max-sm:py-2 max-sm:[&_td]:border-b-0 max-sm:[&_td]:px-3 max-sm:[&_td]:py-0.5 max-sm:[&_td:not(:first-child)]:col-start-2';

/** One drawing, section or net. */
export function RegisterEntry({ row }: { row: RegisterRow }) {
  const { title, beside } = namesOf(row);
  return (
    <tr className={ROW}>
      <Cell className="max-sm:row-span-5">
        <Thumbnail row={row} />
      </Cell>
      <Cell>
        <Link
          to={placeOf(row)}
          {...{ [ROW_LINK]: '' }}
          className="touch inline-flex items-center font-semibold break-words"
        >
          {title}
        </Link>
        {row.isArchived ? <span className="ml-2 text-ink-2">{text.putAwayMark}</span> : null}
        <span className="block break-words text-ink-2">{beside}</span>
        <Found row={row} />
      </Cell>
      <Cell>{row.damName}</Cell>
      <Cell className={lookOf(row)}>{registerStateText(row)}</Cell>
      <Cell>
        <Notes row={row} />
      </Cell>
      <Cell className="whitespace-nowrap max-md:hidden">{shortName(row.madeBy.name)}</Cell>
      <Cell className="whitespace-nowrap text-ink-2 max-md:hidden">
        <time dateTime={row.at} title={formatMoment(row.at)}>
          {text.at(row.kind, formatAgo(row.at))}
        </time>
      </Cell>
    </tr>
  );
}

/** What the row is called, and of what kind and where it is. */
function namesOf(row: RegisterRow): { title: string; beside: string } {
  const drawing = drawingName(row.drawing);
  const kind = text.kindOf(row.kind);
  const joined = (...words: string[]) => words.filter(Boolean).join(', ');
  if (row.section === null) return { title: drawing, beside: joined(kind, row.drawing.title) };
  const section = sectionLabel(row.section);
  if (row.net === null) return { title: section, beside: joined(kind, drawing, row.drawing.title) };
  return { title: row.net, beside: joined(kind, drawing, section) };
}

function placeOf(row: RegisterRow): string {
  if (row.kind === 'net') return paths.net(row.id);
  return row.kind === 'section'
    ? paths.drawing(row.drawing.id, row.sheet?.pageNumber)
    : paths.drawing(row.drawing.id);
}

function lookOf({ states }: RegisterRow): string {
  if (states.includes('unusable')) return 'font-semibold text-wrong';
  if (states.includes('returned')) return 'font-semibold text-attention';
  return states.length === 1 && states[0] === 'accepted' ? 'font-semibold text-good' : '';
}

/** The sheet in small. Decorative: the names stand beside it. */
function Thumbnail({ row: { sheet } }: { row: RegisterRow }) {
  const box = 'h-11 w-16 border border-rule-2 bg-sheet';
  if (sheet === null) return <div className={box} />;
  // Browsers keep it for ever: another picture of the sheet needs another address.
  const query = sheet.pictureId === null ? {} : { picture: sheet.pictureId };
  return (
    <img
      src={apiUrl(`/sheets/${sheet.id}/thumbnail`, query)}
      alt=""
      loading="lazy"
      decoding="async"
      className={`${box} object-contain`}
    />
  );
}

function Notes({ row: { openNotes, unreadNotes } }: { row: RegisterRow }) {
  const isQuiet = openNotes === 0 && unreadNotes === 0;
  if (isQuiet) return <span className="text-ink-2 max-sm:hidden">–</span>;
  return (
    <>
      {openNotes > 0 ? <span className="block">{text.openNotes(openNotes)}</span> : null}
      {unreadNotes > 0 ? (
        <span className="block font-semibold text-attention">{text.unreadNotes(unreadNotes)}</span>
      ) : null}
    </>
  );
}

/** The note that was found, with the words found in it marked. */
function Found({ row: { found } }: { row: RegisterRow }) {
  if (found === null) return null;
  return (
    <p className="mt-1 mb-0 max-w-[60ch] border-l-2 border-rule pl-2 text-sm text-ink-2 break-words">
      {text.foundIn(found.noteNumber)}{' '}
      {found.parts.map((part, place) =>
        part.isHit ? (
          // biome-ignore lint/suspicious/noArrayIndexKey: the parts of one text never change their order
          <mark key={place} className="bg-doubt font-semibold text-ink">
            {part.text}
          </mark>
        ) : (
          part.text
        ),
      )}
    </p>
  );
}

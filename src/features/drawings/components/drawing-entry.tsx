import { Link } from 'react-router-dom';
import { ProgressBar } from '#client/components/progress-bar.tsx';
import { shortName } from '#client/lib/initials.ts';
import { paths } from '#client/lib/paths.ts';
import {
  drawingFacts,
  drawingName,
  jobText,
  netStateText,
  drawingsText as text,
} from '#client/text/drawings.ts';
import type { DrawingDto, NetSummary, SectionDto } from '#shared/contract/drawings.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { isUnderWay } from '../api/drawing-queries.ts';
import { Thumbnail } from './thumbnail.tsx';

/** One drawing of the register. */
export function DrawingEntry({ drawing }: { drawing: DrawingDto }) {
  const name = drawingName(drawing);
  return (
    <li className="grid grid-cols-[168px_minmax(0,1fr)] border-b border-ink max-sm:grid-cols-[92px_minmax(0,1fr)]">
      <Link
        to={paths.drawing(drawing.id)}
        tabIndex={-1}
        aria-hidden="true"
        className="block min-h-[128px] border-r border-ink bg-sheet max-sm:min-h-[92px]"
      >
        <Thumbnail sheet={drawing.sheets[0]} className="h-[128px] w-full max-sm:h-[92px]" />
      </Link>
      <div className="px-3.5 pt-2 pb-1.5 max-sm:px-2.5">
        <h3 className="m-0 inline text-md font-bold">
          <Link to={paths.drawing(drawing.id)} className="no-underline hover:underline">
            {name}
          </Link>
        </h3>
        <span className="ml-2.5 text-ink-2">{drawingFacts(drawing)}</span>
        <JobProgress drawing={drawing} />
        {drawing.sheets.length > 0 ? <SectionRows drawing={drawing} /> : null}
      </div>
    </li>
  );
}

/** How far the preparing of the sheets is, why it was refused, or which pages were left out; nothing otherwise. */
export function JobProgress({ drawing }: { drawing: DrawingDto }) {
  const { job } = drawing;
  if (job.state === 'done')
    return job.message ? <p className="mt-1.5 mb-1 text-attention">{job.message}</p> : null;
  if (!isUnderWay(drawing))
    return (
      <p role="alert" className="mt-1.5 mb-1 text-wrong">
        {text.notRendered} {job.message}
      </p>
    );
  const share = job.pagesTotal ? (job.pagesDone + job.pageProgress) / job.pagesTotal : null;
  return (
    <div className="mt-1.5 max-w-[22.5rem]">
      <p role="status" className="m-0 mb-1 text-ink-2">
        {jobText(job)}
      </p>
      <ProgressBar label={jobText(job)} value={share} />
    </div>
  );
}

interface Row {
  key: string;
  section: SectionDto;
  net: NetSummary | null;
}

/** A row for each net of each section; a section without a net has a row of its own. What was put away is left out. */
function rowsOf(sections: readonly SectionDto[]): Row[] {
  return sections
    .filter((section) => section.archivedAt === null)
    .flatMap((section): Row[] => {
      const nets = section.nets.filter((net) => net.archivedAt === null);
      if (nets.length === 0) return [{ key: section.id, section, net: null }];
      return nets.map((net) => ({ key: net.id, section, net }));
    });
}

function SectionRows({ drawing }: { drawing: DrawingDto }) {
  const rows = rowsOf(drawing.sections);
  return (
    <table className="mt-1.5 w-full max-sm:block [&_tbody]:max-sm:block">
      <caption className="sr-only">{drawingName(drawing)}</caption>
      <tbody>
        {rows.length === 0 ? (
          <tr className={rowClass}>
            <td className={cellClass}>{text.noSection}</td>
            <td className={cellClass}>{text.needsKnownPoints}</td>
          </tr>
        ) : (
          rows.map((row) => <SectionRow key={row.key} row={row} drawingId={drawing.id} />)
        )}
      </tbody>
    </table>
  );
}

const rowClass =
  'border-t border-rule-2 max-sm:flex max-sm:flex-wrap max-sm:items-baseline max-sm:gap-x-2 max-sm:py-1';
const cellClass = 'py-[3px] pr-2 align-baseline max-sm:py-0';

function SectionRow({ row: { section, net }, drawingId }: { row: Row; drawingId: string }) {
  const label = sectionLabel(section);
  if (!net)
    return (
      <tr className={rowClass}>
        <td className={cellClass}>
          <Link to={paths.drawing(drawingId)} className="no-underline hover:underline">
            {label}
          </Link>
        </td>
        <td className={cellClass}>{section.calibrated ? text.toScale : text.needsKnownPoints}</td>
        <td className={`${cellClass} text-right max-sm:hidden`}>–</td>
        <td className={cellClass} />
      </tr>
    );
  return (
    <tr className={rowClass}>
      <td className={cellClass}>
        <Link to={paths.net(net.id)} className="touch underline-offset-2">
          {label}
        </Link>
      </td>
      <td className={cellClass}>
        {net.name}, {section.calibrated ? netStateText(net) : text.notCalibrated}
      </td>
      <td
        className={`${cellClass} text-right whitespace-nowrap ${net.drops === null ? 'max-sm:hidden' : ''}`}
      >
        {net.drops === null ? '–' : text.dropsOf(net.drops)}
      </td>
      <td className={cellClass}>
        <NetMark net={net} />
      </td>
    </tr>
  );
}

/** What stands out about a net: open notes, who checks it, how it was decided. */
function NetMark({ net }: { net: NetSummary }) {
  if (net.openNotes > 0 || net.unreadNotes) return <NotesMark net={net} />;
  if (net.state === 'accepted' && !net.changedSinceRevision)
    return <span className="font-semibold text-good">{capitalised(netStateText(net))}</span>;
  if (net.state === 'accepted' || net.state === 'returned')
    return <span className="font-semibold text-attention">{capitalised(netStateText(net))}</span>;
  return net.state === 'sent' && net.reviewer ? <span>{shortName(net.reviewer.name)}</span> : null;
}

/** Notes open, and those in which something is new to the reader. */
function NotesMark({ net: { openNotes, unreadNotes = 0 } }: { net: NetSummary }) {
  return (
    <span className="font-semibold whitespace-nowrap text-attention">
      {openNotes > 0 ? <span className="block">{text.notesOpen(openNotes)}</span> : null}
      {unreadNotes > 0 ? <span className="block">{text.notesUnread(unreadNotes)}</span> : null}
    </span>
  );
}

const capitalised = (words: string) => words.charAt(0).toLocaleUpperCase() + words.slice(1);

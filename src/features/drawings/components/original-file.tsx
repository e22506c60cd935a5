import { buttonClass } from '#client/components/button.tsx';
import { apiUrl } from '#client/lib/http.ts';
import { byteText, drawingsText as text } from '#client/text/drawings.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';

/** The file as it came: name, size, hash, and the way to fetch it back. */
export function OriginalFile({ drawing }: { drawing: DrawingDto }) {
  const facts = [
    [text.fileName, drawing.fileName],
    [text.fileSize, byteText(drawing.byteSize)],
    [text.sha256, drawing.sha256],
  ];
  return (
    <div className="flex flex-col items-start gap-3 p-3.5">
      <p className="m-0 text-ink-2">{text.originalLead}</p>
      <dl className="m-0 grid w-full grid-cols-[auto_minmax(0,1fr)] gap-x-3 gap-y-1">
        {facts.map(([name, value]) => (
          <div key={name} className="contents">
            <dt className="text-ink-2">{name}</dt>
            <dd className="m-0 break-all">{value}</dd>
          </div>
        ))}
      </dl>
      <a
        className={buttonClass('plain')}
        href={apiUrl(`/drawings/${drawing.id}/original`)}
        download={drawing.fileName}
      >
        {text.download}
      </a>
    </div>
  );
}

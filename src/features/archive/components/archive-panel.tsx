import { Button } from '#client/components/button.tsx';
import { Panel } from '#client/components/panel.tsx';
import { downloadFrom } from '#client/lib/download.ts';
import { apiUrl } from '#client/lib/http.ts';
import { archivesText as text } from '#client/text/archives.ts';

/** Takes the whole dam out as one file, which the browser receives with its own progress. */
export function ArchivePanel({ damId }: { damId: string }) {
  return (
    <Panel title={text.title}>
      <div className="flex flex-col items-start gap-3 p-3.5">
        <p className="m-0">{text.lead}</p>
        <Button onClick={() => downloadFrom(apiUrl(`/dams/${damId}/archive.zip`))}>{text.download}</Button>
      </div>
    </Panel>
  );
}

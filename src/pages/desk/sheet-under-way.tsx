import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { Link } from 'react-router-dom';
import { ProgressBar } from '#client/components/progress-bar.tsx';
import { netKeys } from '#client/features/desk/api/net-queries.ts';
import { drawingQuery, isUnderWay } from '#client/features/drawings/api/drawing-queries.ts';
import { paths } from '#client/lib/paths.ts';
import { firstViewText as text } from '#client/text/first-view.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';

/** Says above a sheet that only its first view is there, how far the rest is, and has it shown when it comes. */
export function SheetUnderWay({ detail }: { detail: NetDetailDto }) {
  return detail.sheet.tiles.readyZoom === undefined ? null : <UnderWay detail={detail} />;
}

function UnderWay({ detail: { net, drawing, sheet } }: { detail: NetDetailDto }) {
  const queryClient = useQueryClient();
  // Asked for again each second as long as it is being prepared.
  const { data: prepared } = useQuery(drawingQuery(drawing.id));
  const now = prepared?.sheets.find((each) => each.id === sheet.id);
  const isReady = now !== undefined && now.tiles.readyZoom === undefined;
  useEffect(() => {
    if (isReady) void queryClient.invalidateQueries({ queryKey: netKeys.detail(net.id) });
  }, [isReady, net.id, queryClient]);

  if (prepared && !isReady && !isUnderWay(prepared))
    return (
      <p role="status" className="m-0 border-b border-rule bg-doubt px-3 py-1.5">
        {text.onlySmall}{' '}
        <Link to={paths.drawing(drawing.id, sheet.pageNumber)} className="touch underline underline-offset-2">
          {text.openDrawing}
        </Link>
      </p>
    );
  return (
    <div className="flex flex-wrap items-center gap-x-3 gap-y-1 border-b border-rule bg-film px-3 py-1.5">
      <p role="status" className="m-0">
        {text.underWay}
      </p>
      <div className="w-40">
        <ProgressBar label={text.progress} value={prepared?.job.pageProgress ?? null} />
      </div>
    </div>
  );
}

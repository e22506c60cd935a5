import { type QueryClient, useQueryClient } from '@tanstack/react-query';
import { netKeys } from '#client/features/desk/api/net-queries.ts';
import type { DeskSession } from '#client/features/desk/saving/desk-session.ts';
import { noteKeys } from '#client/features/notes/api/note-queries.ts';
import { revisionKeys } from '#client/features/revisions/api/revision-queries.ts';
import type { LiveMessage } from '#client/lib/live.ts';
import { useLive } from '#client/lib/use-live.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';

/** Keeps traces, notes and revisions of the open net up with what others do. */
export function useDeskLive(netId: string, session: DeskSession): void {
  const queryClient = useQueryClient();
  const refresh = (queryKey: readonly string[]) => void queryClient.invalidateQueries({ queryKey });
  // A failed question is asked again by the next event or the next opening of the stream.
  const catchUp = () => void session.catchUp().catch(() => {});

  useLive((message: LiveMessage) => {
    if (message.type === 'hello') {
      catchUp();
      refresh(noteKeys.ofNet(netId));
      refresh(revisionKeys.root);
      return;
    }
    // The sheet may be shown by another picture.
    if (message.type === 'drawing' && message.drawingId === drawingOf(netId, queryClient))
      refresh(netKeys.detail(netId));
    if (!('netId' in message) || message.netId !== netId) return;
    if (message.type === 'net' && message.clientId !== session.saving?.clientId) catchUp();
    if (message.type === 'net' && isAsSent(netId, queryClient)) refresh(netKeys.detail(netId));
    if (message.type === 'notes' || message.type === 'notesRead') refresh(noteKeys.ofNet(netId));
    if (message.type === 'revisions') {
      refresh(revisionKeys.root);
      refresh(netKeys.detail(netId));
    }
  });
}

/** The first change after a revision ends what the title block says of the check; later ones do not. */
function isAsSent(netId: string, queryClient: QueryClient): boolean {
  const net = queryClient.getQueryData<NetDetailDto>(netKeys.detail(netId))?.net;
  return net !== undefined && net.state !== 'draft' && !net.changedSinceRevision;
}

function drawingOf(netId: string, queryClient: QueryClient): string | undefined {
  return queryClient.getQueryData<NetDetailDto>(netKeys.detail(netId))?.drawing.id;
}

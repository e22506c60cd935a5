import { useQueryClient } from '@tanstack/react-query';
import { noteKeys } from '#client/features/notes/api/note-queries.ts';
import { revisionKeys } from '#client/features/revisions/api/revision-queries.ts';
import { useLive } from '#client/lib/use-live.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';

/** Follows notes and the decision; the frozen content itself never changes. */
export function useCheckLive({ payload }: RevisionDto): void {
  const queryClient = useQueryClient();
  useLive((message) => {
    const own = message.type === 'hello' || ('netId' in message && message.netId === payload.netId);
    if (!own || message.type === 'presence') return;
    if (message.type !== 'revisions') {
      void queryClient.invalidateQueries({ queryKey: noteKeys.ofNet(payload.netId) });
    }
    if (message.type !== 'notes' && message.type !== 'notesRead')
      void queryClient.invalidateQueries({ queryKey: revisionKeys.root });
  });
}

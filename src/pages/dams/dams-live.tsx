import { useQueryClient } from '@tanstack/react-query';
import { damKeys } from '#client/features/dams/api/dam-queries.ts';
import { useLive } from '#client/lib/use-live.ts';

/** Keeps the dams and what waits up to date with what others do; strokes on a net change nothing of either. */
export function DamsLive() {
  const queryClient = useQueryClient();
  useLive((message) => {
    if (message.type === 'net' || message.type === 'presence') return;
    // The stream has just opened: what was fetched a moment ago need not be fetched again.
    if (message.type === 'hello')
      void queryClient.refetchQueries({ queryKey: damKeys.root, type: 'active', stale: true });
    else void queryClient.invalidateQueries({ queryKey: damKeys.root });
  });
  return null;
}

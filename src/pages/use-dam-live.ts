import { useQueryClient } from '@tanstack/react-query';
import { activityKeys } from '#client/features/activity/api/activity-queries.ts';
import { damKeys } from '#client/features/dams/api/dam-queries.ts';
import { drawingKeys } from '#client/features/drawings/api/drawing-queries.ts';
import { useLive } from '#client/lib/use-live.ts';

/**
 * Keeps a dam's page and its drawings' pages up to date with what others do. Single strokes on a net come every
 * second while somebody traces and change nothing shown here.
 */
export function useDamLive(damId: string): void {
  const queryClient = useQueryClient();
  useLive((message) => {
    if (message.type === 'net' || message.type === 'presence') return;
    if ('damId' in message && message.damId !== damId) return;
    for (const queryKey of [drawingKeys.root, damKeys.root, activityKeys.root])
      void queryClient.invalidateQueries({ queryKey });
  });
}

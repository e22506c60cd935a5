import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendJson } from '#client/lib/http.ts';
import { restoredDto } from '#shared/contract/archives.ts';

/** Sends an archive to be restored; every list of dams and people is loaded again. */
export function useRestoreDam() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (file: File) => sendJson('POST', '/archives', restoredDto, { body: file }),
    onSuccess: () => queryClient.invalidateQueries(),
  });
}

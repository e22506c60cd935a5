import { useMutation, useQueryClient } from '@tanstack/react-query';
import { v7 as newUuid } from 'uuid';
import { drawingKeys } from '#client/features/drawings/api/drawing-queries.ts';
import { sendJson } from '#client/lib/http.ts';
import { type CarriedSectionInput, carriedSectionDto } from '#shared/contract/carry-across.ts';

export type CarryingInput = Omit<CarriedSectionInput, 'id' | 'nets'> & { readonly netIds: readonly string[] };

/** Carries a section with nets to a sheet; what is shown of drawings is loaded again. */
export function useCarryAcross(sheetId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ netIds, ...input }: CarryingInput) =>
      sendJson('POST', `/sheets/${sheetId}/carried-sections`, carriedSectionDto, {
        body: { ...input, id: newUuid(), nets: netIds.map((fromNetId) => ({ fromNetId, id: newUuid() })) },
      }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: drawingKeys.root }),
  });
}

import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { v7 as uuidv7 } from 'uuid';
import { getJson, sendJson } from '#client/lib/http.ts';
import {
  type RenditionDto,
  type RenditionSettings,
  renditionDto,
  renditionListDto,
} from '#shared/contract/renditions.ts';

// Below the key of the drawings, so that what renews them renews these: a drawing's event tells of its pictures too.
const keyOf = (sheetId: string) => ['drawings', 'renditions', sheetId] as const;
const DRAWINGS = ['drawings'] as const;
/** How often the progress of a picture being made is asked for. */
const PROGRESS_MS = 1000;

export const isBeingMade = ({ state }: RenditionDto) => state === 'waiting' || state === 'running';

export const renditionsQuery = (sheetId: string) =>
  queryOptions({
    queryKey: keyOf(sheetId),
    queryFn: async ({ signal }) =>
      (await getJson(`/sheets/${sheetId}/renditions`, renditionListDto, { signal })).items,
    refetchInterval: (query) => (query.state.data?.some(isBeingMade) ? PROGRESS_MS : false),
  });

export function useMakeRendition(sheetId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (settings: RenditionSettings) =>
      sendJson('POST', `/sheets/${sheetId}/renditions`, renditionDto, {
        body: { id: uuidv7(), settings },
      }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: keyOf(sheetId) }),
  });
}

/** Shows the sheet by one of its pictures, or as it was scanned. */
export function useShowRendition(sheetId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (renditionId: string | null) =>
      sendJson('POST', `/sheets/${sheetId}/show-rendition`, renditionListDto, { body: { renditionId } }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: DRAWINGS }),
  });
}

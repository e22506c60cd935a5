import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import { apiUrl, getJson, sendJson } from '#client/lib/http.ts';
import {
  type CalculationSheetDto,
  calculationSheetDto,
  type calculationSheetInput,
  calculationSheetListDto,
} from '#shared/contract/calculation-sheets.ts';

const keyOf = (netId: string) => ['calculation-sheets', netId] as const;

/** Asks again this often while a sheet is being made. */
const POLL_MS = 1500;

export const calculationSheetsQuery = (netId: string) =>
  queryOptions({
    queryKey: keyOf(netId),
    queryFn: async ({ signal }) =>
      (await getJson(`/nets/${netId}/calculation-sheets`, calculationSheetListDto, { signal })).items,
    refetchInterval: (query) =>
      query.state.data?.some((sheet: CalculationSheetDto) => sheet.state === 'waiting') ? POLL_MS : false,
  });

export function useAskForSheet(netId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: z.input<typeof calculationSheetInput>) =>
      sendJson('POST', `/nets/${netId}/calculation-sheets`, calculationSheetDto, { body }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: keyOf(netId) }),
  });
}

export const sheetFileUrl = (netId: string, sheetId: string) =>
  apiUrl(`/nets/${netId}/calculation-sheets/${sheetId}/file`);

import { useMutation, useQueryClient } from '@tanstack/react-query';
import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { send, sendJson } from '#client/lib/http.ts';
import {
  type DrawingDto,
  drawingDto,
  type drawingPatch,
  netSummary,
  sectionDto,
} from '#shared/contract/drawings.ts';
import type { sectionPatch } from '#shared/contract/nets.ts';
import { drawingKeys } from './drawing-queries.ts';

export type DrawingPatch = z.input<typeof drawingPatch>;
export type SectionFields = Required<z.input<typeof sectionPatch>>;

/** A write after which everything shown of drawings is loaded again. */
function useDrawingsWrite<Input, Output>(write: (input: Input) => Promise<Output>) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: write,
    onSuccess: () => queryClient.invalidateQueries({ queryKey: drawingKeys.root }),
  });
}

/** The answer is the drawing itself: it is shown at once. */
export function useEditDrawing(drawingId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: DrawingPatch): Promise<DrawingDto> =>
      sendJson('PATCH', `/drawings/${drawingId}`, drawingDto, { body }),
    onSuccess: (drawing) => {
      queryClient.setQueryData(drawingKeys.detail(drawingId), drawing);
      return queryClient.invalidateQueries({ queryKey: drawingKeys.lists });
    },
  });
}

export const usePrepareAgain = (drawingId: string) =>
  useDrawingsWrite(() => sendJson('POST', `/drawings/${drawingId}/prepare-again`, drawingDto));

export const useDrawAgain = (sheetId: string) =>
  useDrawingsWrite((dpi: number) =>
    sendJson('POST', `/sheets/${sheetId}/draw-again`, drawingDto, { body: { dpi } }),
  );

export const useCreateSection = (sheetId: string) =>
  useDrawingsWrite((fields: SectionFields) =>
    sendJson('POST', `/sheets/${sheetId}/sections`, sectionDto, { body: { id: uuidv7(), ...fields } }),
  );

export const useEditSection = (sectionId: string) =>
  useDrawingsWrite((fields: SectionFields) =>
    sendJson('PATCH', `/sections/${sectionId}`, sectionDto, { body: fields }),
  );

export const useCreateNet = (sectionId: string) =>
  useDrawingsWrite((name: string) =>
    sendJson('POST', `/sections/${sectionId}/nets`, netSummary, { body: { id: uuidv7(), name } }),
  );

export const useCopyNet = (netId: string) =>
  useDrawingsWrite((name: string) =>
    sendJson('POST', `/nets/${netId}/copy`, netSummary, { body: { id: uuidv7(), name } }),
  );

export const useRenameNet = (netId: string) =>
  useDrawingsWrite((name: string) => sendJson('PATCH', `/nets/${netId}`, netSummary, { body: { name } }));

export type Archivable = 'drawings' | 'sections' | 'nets';

/** Puts a drawing, section or net away or brings it back; nothing is destroyed. */
export const useArchive = (kind: Archivable, id: string) =>
  useDrawingsWrite((archived: boolean) => send('POST', `/${kind}/${id}/${archived ? 'archive' : 'restore'}`));

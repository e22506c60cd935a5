import { useMutation, useQueryClient } from '@tanstack/react-query';
import { v7 as uuidv7 } from 'uuid';
import * as z from 'zod/mini';
import { ApiProblem } from '#client/lib/api-problem.ts';
import { sendJson } from '#client/lib/http.ts';
import { type NetFileQuestion, netFileDto, netFileQuestions } from '#shared/contract/net-files.ts';
import { drawingKeys } from './drawing-queries.ts';

/** Where a net file is put: on a section of the sheet it was traced on, or on an empty sheet of its size. */
export type NetFileTarget = { sectionId: string } | { damId: string };

export interface NetFileFields {
  name: string;
  sectionName: string;
  text: string;
  accepted: readonly NetFileQuestion[];
}

export function useTakeNetFile(target: NetFileTarget) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ sectionName, ...fields }: NetFileFields) =>
      'sectionId' in target
        ? sendJson('POST', `/sections/${target.sectionId}/net-files`, netFileDto, {
            body: { id: uuidv7(), ...fields },
          })
        : sendJson('POST', `/dams/${target.damId}/net-files`, netFileDto, {
            body: { id: uuidv7(), sectionName, ...fields },
          }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: drawingKeys.root }),
  });
}

/** What the server asks before it makes the net; empty when the error is none of these. */
export function openQuestions(error: unknown): z.output<typeof netFileQuestions>['questions'] {
  if (!(error instanceof ApiProblem)) return [];
  const parsed = z.safeParse(netFileQuestions, error.problem.extra);
  return parsed.success ? parsed.data.questions : [];
}

import { useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import { send, sendJson } from '#client/lib/http.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import { type DamDto, damDto, type damInput } from '#shared/contract/dams.ts';
import { damKeys } from './dam-queries.ts';

export type DamInput = z.input<typeof damInput>;

/** A write whose answer is the dam: it goes into the dam's page, and the lists are loaded again. */
function useDamWrite<Input>(write: (input: Input) => Promise<DamDto>) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: write,
    onSuccess: async (dam) => {
      queryClient.setQueryData(damKeys.detail(dam.id), dam);
      await queryClient.invalidateQueries({ queryKey: ['dams', 'list'] });
    },
  });
}

export const useCreateDam = () =>
  useDamWrite((body: DamInput) => sendJson('POST', '/dams', damDto, { body }));

export const useEditDam = (damId: string) =>
  useDamWrite((body: DamInput) => sendJson('PATCH', `/dams/${damId}`, damDto, { body }));

/** Puts a dam away or brings it back. */
export function useArchiveDam(damId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (archived: boolean) => send('POST', `/dams/${damId}/${archived ? 'archive' : 'restore'}`),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: damKeys.root }),
  });
}

function useMemberWrite<Input>(damId: string, write: (input: Input) => Promise<void>) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: write,
    onSuccess: () =>
      Promise.all([
        queryClient.invalidateQueries({ queryKey: damKeys.members(damId) }),
        // One's own parts may have changed, and with them what one may do.
        queryClient.invalidateQueries({ queryKey: damKeys.detail(damId) }),
      ]),
  });
}

export const useSetRoles = (damId: string) =>
  useMemberWrite(damId, ({ personId, roles }: { personId: string; roles: DamRole[] }) =>
    send('PUT', `/dams/${damId}/members/${personId}`, { body: { roles } }),
  );

export const useRemoveMember = (damId: string) =>
  useMemberWrite(damId, (personId: string) => send('DELETE', `/dams/${damId}/members/${personId}`));

export const useInviteMember = (damId: string) =>
  useMemberWrite(damId, (body: { email: string; roles: DamRole[] }) =>
    send('POST', `/dams/${damId}/members/invitations`, { body }),
  );

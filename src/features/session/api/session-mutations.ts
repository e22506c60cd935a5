import { type QueryClient, useMutation, useQueryClient } from '@tanstack/react-query';
import { send, sendJson } from '#client/lib/http.ts';
import { announce, currentPersonId, rememberSession } from '#client/lib/sign-in-state.ts';
import { type SessionDto, sessionDto } from '#shared/contract/people.ts';
import { sessionKeys } from './session-queries.ts';

/** Takes over a new session. What another person had loaded is forgotten first. */
function takeOver(queryClient: QueryClient, session: SessionDto, previousPersonId: string | null): void {
  if (previousPersonId !== session.person?.id) queryClient.clear();
  rememberSession(session);
  queryClient.setQueryData(sessionKeys.root, session);
  announce('signedIn');
}

/** A write that ends in a new session: signing in and accepting an invitation. */
function useSessionStart<Input>(start: (input: Input) => Promise<SessionDto>) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async (input: Input) => {
      const previousPersonId = currentPersonId();
      return { session: await start(input), previousPersonId };
    },
    onSuccess: ({ session, previousPersonId }) => takeOver(queryClient, session, previousPersonId),
  });
}

export const useSignIn = () =>
  useSessionStart((body: { email: string; password: string }) =>
    sendJson('POST', '/session', sessionDto, { body }),
  );

export const useAcceptInvitation = () =>
  useSessionStart((body: { token: string; name: string; password: string }) =>
    sendJson('POST', '/invitations/accept', sessionDto, { body }),
  );

export const useEndAllSessions = () => useMutation({ mutationFn: () => send('POST', '/session/end-all') });

export const useRequestReset = () =>
  useMutation({
    mutationFn: (body: { email: string }) => send('POST', '/password-resets', { body }),
  });

export const useSetPassword = () =>
  useMutation({
    mutationFn: (body: { token: string; password: string }) =>
      send('POST', '/password-resets/complete', { body }),
  });

/** The server may renew the session with the password, so who is signed in is asked again. */
export function useChangePassword() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: { current: string; next: string }) => send('POST', '/me/password', { body }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: sessionKeys.root }),
  });
}

export function useRename() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: { name: string }) => send('PATCH', '/me', { body }),
    onSuccess: () => queryClient.invalidateQueries(),
  });
}

import { queryOptions } from '@tanstack/react-query';
import { getJson, sendJson } from '#client/lib/http.ts';
import { rememberSession } from '#client/lib/sign-in-state.ts';
import { invitationDto, type SessionDto, sessionDto } from '#shared/contract/people.ts';

export const sessionKeys = {
  root: ['session'] as const,
  invitation: (token: string) => ['session', 'invitation', token] as const,
};

/** Who is signed in. Also keeps the token that writes carry. */
export const sessionQuery = () =>
  queryOptions({
    queryKey: sessionKeys.root,
    queryFn: async ({ signal }): Promise<SessionDto> => {
      const session = await getJson('/session', sessionDto, { signal });
      rememberSession(session);
      return session;
    },
    staleTime: 5 * 60_000,
  });

/** What an invitation is for. The token came in the address's fragment and goes in the body, never in an address. */
export const invitationQuery = (token: string) =>
  queryOptions({
    queryKey: sessionKeys.invitation(token),
    queryFn: ({ signal }) =>
      sendJson('POST', '/invitations/look-up', invitationDto, { body: { token }, signal }),
    staleTime: Number.POSITIVE_INFINITY,
    retry: false,
  });

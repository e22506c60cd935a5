import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { getJson, sendJson } from '#client/lib/http.ts';
import { type PersonDto, personDto, personListDto } from '#shared/contract/people.ts';

export const peopleKeys = { root: ['people'] as const };

export const peopleQuery = () =>
  queryOptions({
    queryKey: peopleKeys.root,
    queryFn: async ({ signal }) => (await getJson('/people', personListDto, { signal })).items,
  });

function usePeopleWrite<Input>(write: (input: Input) => Promise<PersonDto>) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: write,
    onSuccess: () => queryClient.invalidateQueries({ queryKey: peopleKeys.root }),
  });
}

export const useInvitePerson = () =>
  usePeopleWrite((body: { email: string; admin: boolean }) =>
    sendJson('POST', '/people/invitations', personDto, { body }),
  );

export const useChangePerson = (personId: string) =>
  usePeopleWrite((body: { admin?: boolean; active?: boolean }) =>
    sendJson('PATCH', `/people/${personId}`, personDto, { body }),
  );

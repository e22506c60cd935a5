import { infiniteQueryOptions, keepPreviousData } from '@tanstack/react-query';
import { getJson } from '#client/lib/http.ts';
import { registerPage } from '#shared/contract/register.ts';
import type { RegisterFilters } from '../model/register-filters.ts';

export const registerKeys = { root: ['register'] as const };

/** The register as filtered, page by page. While other filters are asked for, what was found before stays. */
export const registerQuery = (filters: RegisterFilters) =>
  infiniteQueryOptions({
    queryKey: [...registerKeys.root, filters],
    queryFn: ({ pageParam, signal }) =>
      getJson('/register', registerPage, { query: { ...filters, cursor: pageParam }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    placeholderData: keepPreviousData,
  });

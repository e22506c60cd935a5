import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { getJson } from '#client/lib/http.ts';
import { damSeepageDto } from '#shared/contract/dam-seepage.ts';
import { damKeys } from './dam-queries.ts';

export const damSeepageKey = (damId: string) => [...damKeys.root, 'seepage', damId] as const;

/** Seepage along a dam from the nets chosen. Figures of nets that may have changed since are not shown again. */
export const damSeepageQuery = (damId: string, nets: readonly string[]) =>
  queryOptions({
    queryKey: [...damSeepageKey(damId), ...nets],
    queryFn: ({ signal }) => {
      const query = { nets: nets.length === 0 ? undefined : nets.join(',') };
      return getJson(`/dams/${damId}/seepage`, damSeepageDto, { query, signal });
    },
    staleTime: 0,
    gcTime: 0,
    placeholderData: keepPreviousData,
  });

import { queryOptions } from '@tanstack/react-query';
import { getJson } from '#client/lib/http.ts';
import { type DrawingDto, drawingDto, drawingListDto } from '#shared/contract/drawings.ts';

export const drawingKeys = {
  root: ['drawings'] as const,
  list: (damId: string, archived: boolean) => ['drawings', 'list', damId, archived] as const,
  lists: ['drawings', 'list'] as const,
  detail: (drawingId: string) => ['drawings', 'detail', drawingId] as const,
};

/** How often the progress of a file being prepared is asked for. */
const PROGRESS_MS = 1000;

export const isUnderWay = (drawing: DrawingDto): boolean =>
  drawing.job.state === 'waiting' || drawing.job.state === 'running';

export const drawingListQuery = (damId: string, archived: boolean) =>
  queryOptions({
    queryKey: drawingKeys.list(damId, archived),
    queryFn: async ({ signal }) => {
      const query = { archived: archived ? 'yes' : 'no' };
      return (await getJson(`/dams/${damId}/drawings`, drawingListDto, { query, signal })).items;
    },
    // An upload may have ended while another page was open.
    refetchOnMount: 'always',
    refetchInterval: (query) => (query.state.data?.some(isUnderWay) ? PROGRESS_MS : false),
  });

export const drawingQuery = (drawingId: string) =>
  queryOptions({
    queryKey: drawingKeys.detail(drawingId),
    queryFn: ({ signal }) => getJson(`/drawings/${drawingId}`, drawingDto, { signal }),
    refetchInterval: (query) => (query.state.data && isUnderWay(query.state.data) ? PROGRESS_MS : false),
  });

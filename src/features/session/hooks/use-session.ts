import { useSuspenseQuery } from '@tanstack/react-query';
import type { SessionDto } from '#shared/contract/people.ts';
import { sessionQuery } from '../api/session-queries.ts';

export const useSession = (): SessionDto => useSuspenseQuery(sessionQuery()).data;

import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { type ReactNode, StrictMode, Suspense } from 'react';
import { Loading } from './components/loading.tsx';
import { NoticeProvider } from './components/notice.tsx';
import { ApiProblem } from './lib/api-problem.ts';

const MAX_RETRIES = 2;

/** Trying again helps only when nothing answered or the server was overloaded. */
function isWorthRetrying(failures: number, error: unknown): boolean {
  if (failures >= MAX_RETRIES) return false;
  return error instanceof ApiProblem && (error.isNoConnection || [502, 503, 504].includes(error.status));
}

export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      // `always`: without a connection the page says so at once, instead of waiting silently for one.
      queries: { staleTime: 10_000, retry: isWorthRetrying, networkMode: 'always' },
      mutations: { retry: false, networkMode: 'always' },
    },
  });
}

interface ProvidersProps {
  queryClient: QueryClient;
  children: ReactNode;
}

export function Providers({ queryClient, children }: ProvidersProps) {
  return (
    <StrictMode>
      <QueryClientProvider client={queryClient}>
        <NoticeProvider>
          <Suspense fallback={<Loading />}>{children}</Suspense>
        </NoticeProvider>
      </QueryClientProvider>
    </StrictMode>
  );
}

import './styles/app.css';
import { createRoot } from 'react-dom/client';
import { Loading } from './components/loading.tsx';
import { sessionQuery } from './features/session/api/session-queries.ts';
import { ApiProblem } from './lib/api-problem.ts';
import { createQueryClient, Providers } from './providers.tsx';
import { fetchFirstPage, Pages } from './router.tsx';

const container = document.getElementById('root');
if (!container) throw new Error('The page has no element with id root.');
const queryClient = createQueryClient();
const root = createRoot(container, {
  onCaughtError: (error) => {
    // A refusal of the server is shown where it happened; only faults of the page itself belong in the console.
    if (!(error instanceof ApiProblem)) console.error(error);
  },
});
root.render(<Loading />);
void open();

/** What waited by suspending instead would be held back by React for 300 ms. */
async function open(): Promise<void> {
  await queryClient.prefetchQuery(sessionQuery());
  const session = queryClient.getQueryData(sessionQuery().queryKey);
  await fetchFirstPage(window.location.pathname, Boolean(session?.person));
  root.render(
    <Providers queryClient={queryClient}>
      <Pages />
    </Providers>,
  );
}

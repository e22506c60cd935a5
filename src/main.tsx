import './styles/app.css';
import { createRoot } from 'react-dom/client';
import { sessionQuery } from './features/session/api/session-queries.ts';
import { ApiProblem } from './lib/api-problem.ts';
import { createQueryClient, Providers } from './providers.tsx';
import { Pages } from './router.tsx';

const queryClient = createQueryClient();
// Who is signed in is asked at once, while the page's own script is still on its way.
void queryClient.prefetchQuery(sessionQuery());

const root = document.getElementById('root');
if (!root) throw new Error('The page has no element with id root.');
createRoot(root, {
  onCaughtError: (error) => {
    // A refusal of the server is shown where it happened; only faults of the page itself belong in the console.
    if (!(error instanceof ApiProblem)) console.error(error);
  },
}).render(
  <Providers queryClient={queryClient}>
    <Pages />
  </Providers>,
);

import './styles/app.css';
import { createRoot } from 'react-dom/client';
import { sessionQuery } from './features/session/api/session-queries.ts';
import { createQueryClient, Providers } from './providers.tsx';
import { createRouter } from './router.tsx';

const queryClient = createQueryClient();
// Who is signed in is asked at once, while the page's own script is still on its way.
void queryClient.prefetchQuery(sessionQuery());

const root = document.getElementById('root');
if (!root) throw new Error('The page has no element with id root.');
createRoot(root).render(<Providers queryClient={queryClient} router={createRouter()} />);

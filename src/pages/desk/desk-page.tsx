import { useParams } from 'react-router-dom';
import { Loading } from '#client/components/loading.tsx';
import { useDeskSession } from '#client/features/desk/components/use-desk-session.ts';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { AppFrame } from '../app-frame.tsx';
import { OpenDesk } from './open-desk.tsx';

/** The desk of one net. Another net, or another person, is another desk. */
export function DeskPage() {
  const { netId = '' } = useParams();
  const { person } = useSession();
  return <Desk key={`${netId} ${person?.id}`} netId={netId} personId={person?.id ?? ''} />;
}

function Desk({ netId, personId }: { netId: string; personId: string }) {
  const { session, error, takeOver } = useDeskSession(netId, personId);
  // The route's own error page says what happened and tries again.
  if (error) throw error;
  if (session) {
    return (
      <OpenDesk key={session.readOnly ?? 'writer'} netId={netId} session={session} takeOver={takeOver} />
    );
  }
  return (
    <AppFrame trail={[]}>
      <main id="content">
        <Loading />
      </main>
    </AppFrame>
  );
}

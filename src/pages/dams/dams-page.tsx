import { lazy, Suspense } from 'react';
import { Link, useSearchParams } from 'react-router-dom';
import { ButtonLink } from '#client/components/button.tsx';
import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { Part } from '#client/components/part.tsx';
import { DamList } from '#client/features/dams/components/dam-list.tsx';
import { WaitingList } from '#client/features/dams/components/waiting-list.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { paths } from '#client/lib/paths.ts';
import { damsText as text } from '#client/text/dams.ts';
import { registerLinkText as registerText } from '#client/text/register-links.ts';
import { waitingText } from '#client/text/waiting.ts';
import { AppFrame } from '../app-frame.tsx';

/** After the first load, of which it is no part. */
const DamsLive = lazy(async () => ({ default: (await import('./dams-live.tsx')).DamsLive }));

export function DamsPage() {
  const session = useSession();
  const [search] = useSearchParams();
  const archived = search.get('show') === 'put-away';
  const canCreate = session.can.includes('dam.create');
  return (
    <AppFrame trail={[{ label: text.title }]}>
      <Page
        title={text.title}
        heading={text.yours}
        action={
          <ButtonLink look="quiet" to={paths.register()}>
            {registerText.open}
          </ButtonLink>
        }
      >
        <Suspense>
          <DamsLive />
        </Suspense>
        <div className="flex flex-col gap-6">
          <Panel title={waitingText.title} look="register">
            <Part>
              <WaitingList wide />
            </Part>
          </Panel>
          <Panel
            look="register"
            title={archived ? `${text.title}, ${text.putAwayMark}` : text.title}
            action={
              canCreate ? (
                <ButtonLink look="main" to={paths.newDam}>
                  {text.newDam}
                </ButtonLink>
              ) : null
            }
          >
            <Part>
              <DamList archived={archived} canCreate={canCreate} />
            </Part>
            <p className="m-0 px-3.5 py-2.5 text-sm">
              <Link to={archived ? '?' : '?show=put-away'}>
                {archived ? text.hidePutAway : text.showPutAway}
              </Link>
            </p>
          </Panel>
        </div>
      </Page>
    </AppFrame>
  );
}

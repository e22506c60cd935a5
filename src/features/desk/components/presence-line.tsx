import { useEffect } from 'react';
import { useStore } from 'zustand';
import { Menu } from '#client/components/menu.tsx';
import { initialsOf } from '#client/lib/initials.ts';
import { presenceText as text } from '#client/text/presence.ts';
import type { PresentDesk } from '#shared/contract/presence.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { Presence } from '../saving/presence.ts';
import { nameOf, placeInHand, presenceGuides, presenceSentence } from './presence-words.ts';

/** So many are shown by their initials; the list names all. */
const SHOWN = 3;

interface PresenceLineProps {
  presence: Presence;
  store: DeskStore;
  ownId: string | null;
}

/** The others on this net, by their initials in the top bar; pressed, what each of them has in hand. */
export function PresenceLine({ presence, store, ownId }: PresenceLineProps) {
  const others = useStore(presence.others);
  usePresenceMarks(others, store, ownId);
  const names = [...new Set(others.map((desk) => nameOf(desk, ownId)))];
  return (
    <>
      <span role="status" className="sr-only">
        {others.length === 0 ? '' : text.here(names.join(', '))}
      </span>
      {others.length === 0 ? null : (
        <Menu
          label={text.here(names.join(', '))}
          button={<Initials others={others} />}
          buttonClassName="flex items-center gap-0.5 border-0 bg-transparent p-0 touch"
        >
          {(close) => <PresenceList others={others} store={store} ownId={ownId} close={close} />}
        </Menu>
      )}
    </>
  );
}

function Initials({ others }: { others: readonly PresentDesk[] }) {
  const rest = others.length - SHOWN;
  return (
    <>
      {others.slice(0, SHOWN).map(({ clientId, person }) => (
        <span
          key={clientId}
          aria-hidden="true"
          title={person.name}
          className="flex size-[1.625rem] items-center justify-center rounded-full border border-edge border-dashed bg-film text-xs font-semibold text-ink-2"
        >
          {initialsOf(person.name)}
        </span>
      ))}
      {rest > 0 ? <span className="pl-1 text-sm text-ink-2">{text.more(rest)}</span> : null}
    </>
  );
}

function PresenceList({
  others,
  store,
  ownId,
  close,
}: Omit<PresenceLineProps, 'presence'> & { others: readonly PresentDesk[]; close: () => void }) {
  const document = useStore(store, (state) => state.document);
  const reading = useStore(store, (state) => state.reading);
  const shown = { document, reading };
  return (
    <>
      <h2 className="m-0 px-3 py-1 text-sm font-semibold text-ink-2">{text.title}</h2>
      <ul className="m-0 list-none p-0">
        {others.map((desk) => {
          const at = placeInHand(desk, shown);
          return (
            <li key={desk.clientId} className="px-3 py-1">
              {presenceSentence(desk, nameOf(desk, ownId), shown)}
              {at === null ? null : (
                <button
                  type="button"
                  className="block border-0 bg-transparent p-0 text-left text-sm underline underline-offset-2 touch"
                  onClick={() => {
                    store.lookAt(at);
                    close();
                  }}
                >
                  {text.show}
                </button>
              )}
            </li>
          );
        })}
      </ul>
    </>
  );
}

/** Marks on the sheet what the others have in hand, as it lies there now. */
function usePresenceMarks(others: readonly PresentDesk[], store: DeskStore, ownId: string | null): void {
  const document = useStore(store, (state) => state.document);
  const reading = useStore(store, (state) => state.reading);
  useEffect(() => {
    store.setGuides('presence', presenceGuides(others, { document, reading }, ownId));
  }, [others, document, reading, store, ownId]);
  useEffect(() => () => store.setGuides('presence', null), [store]);
}

import { useEffect, useState } from 'react';
import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { Actions, Dialog } from '#client/components/dialog.tsx';
import type { DeskSession } from '#client/features/desk/saving/desk-session.ts';
import { SendDialog } from '#client/features/revisions/components/send-dialog.tsx';
import { commonText } from '#client/text/common.ts';
import { sendingText as text } from '#client/text/revisions.ts';
import type { RevisionSummary } from '#shared/contract/revisions.ts';

interface SendForCheckingProps {
  netId: string;
  session: DeskSession;
  onClose: () => void;
  onSent: (revision: RevisionSummary) => void;
}

/**
 * Sends what is on the sheet and nothing else: whatever waits is saved first, and the newest change known is named, so
 * that the server refuses when somebody has changed the net since.
 */
export function SendForChecking({ netId, session, onClose, onSent }: SendForCheckingProps) {
  const [state, setState] = useState<'saving' | 'blocked' | 'ready'>('saving');
  const changeNumber = useStore(session.store, (desk) => desk.changeNumber);
  useEffect(() => {
    let ended = false;
    saveAll(session).then((next) => ended || setState(next));
    return () => {
      ended = true;
    };
  }, [session]);
  if (state === 'ready') {
    return <SendDialog netId={netId} changeNumber={changeNumber} onClose={onClose} onSent={onSent} />;
  }
  return (
    <Dialog title={text.button} onClose={onClose}>
      <p className="m-0">{state === 'saving' ? text.unsaved : text.unsavedBlocked}</p>
      <Actions>
        <Button onClick={onClose}>{commonText.close}</Button>
      </Actions>
    </Dialog>
  );
}

async function saveAll({ saving, catchUp }: DeskSession): Promise<'ready' | 'blocked'> {
  if (!saving) return 'blocked';
  await saving.flush();
  const { unsent, conflicts, refused } = saving.state.getState();
  if (unsent > 0 || conflicts.length > 0 || refused.length > 0) return 'blocked';
  return catchUp().then(
    () => 'ready' as const,
    () => 'blocked' as const,
  );
}

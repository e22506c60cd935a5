import { useState } from 'react';
import { Link } from 'react-router-dom';
import { Menu, menuItemClass } from '#client/components/menu.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { paths } from '#client/lib/paths.ts';
import { netStateText, drawingsText as text } from '#client/text/drawings.ts';
import type { NetSummary } from '#shared/contract/drawings.ts';
import { useArchive, useCopyNet, useRenameNet } from '../api/drawing-mutations.ts';
import { NameDialog } from './name-dialog.tsx';

interface NetItemProps {
  net: NetSummary;
  canTrace: boolean;
  canArchive: boolean;
}

/** One net of a section: a way to its desk, its state, and what can be done with it. */
export function NetItem({ net, canTrace, canArchive }: NetItemProps) {
  const [asking, setAsking] = useState<'copy' | 'rename' | null>(null);
  const archive = useArchive('nets', net.id);
  const notice = useNotice();
  const isAway = net.archivedAt !== null;
  const putAway = () =>
    archive.mutate(!isAway, {
      onSuccess: () => notice(isAway ? text.broughtBack(net.name) : text.putAwayDone(net.name)),
    });
  return (
    <li className="flex items-start gap-2 border-t border-rule-2 py-1.5">
      <div className="min-w-0 flex-1">
        <Link to={paths.net(net.id)} className="touch font-semibold break-words">
          {net.name}
        </Link>
        <span className="block text-sm text-ink-2">
          {netStateText(net)}
          {net.drops === null ? '' : `, ${text.dropsOf(net.drops)}`}
          {net.openNotes > 0 ? `, ${text.notesOpen(net.openNotes)}` : ''}
          {isAway ? `, ${text.putAwayMark}` : ''}
          {net.unreadNotes ? (
            <b className="block font-semibold text-attention">{text.notesUnread(net.unreadNotes)}</b>
          ) : null}
        </span>
        <ProblemNote error={archive.error} />
      </div>
      {canTrace || canArchive ? (
        <Menu label={text.more(net.name)} button="⋯" buttonClassName="px-2 leading-none">
          {(close) => (
            <>
              {canTrace && !isAway ? (
                <>
                  <MenuButton label={text.copyNet} onPress={() => setAsking('copy')} close={close} />
                  <MenuButton label={text.renameNet} onPress={() => setAsking('rename')} close={close} />
                </>
              ) : null}
              {canArchive ? (
                <MenuButton label={isAway ? text.bringBack : text.putAway} onPress={putAway} close={close} />
              ) : null}
            </>
          )}
        </Menu>
      ) : null}
      {asking === 'copy' ? <CopyDialog net={net} onClose={() => setAsking(null)} /> : null}
      {asking === 'rename' ? <RenameDialog net={net} onClose={() => setAsking(null)} /> : null}
    </li>
  );
}

function MenuButton({ label, onPress, close }: { label: string; onPress: () => void; close: () => void }) {
  return (
    <button
      type="button"
      className={menuItemClass}
      onClick={() => {
        close();
        onPress();
      }}
    >
      {label}
    </button>
  );
}

function CopyDialog({ net, onClose }: { net: NetSummary; onClose: () => void }) {
  const copy = useCopyNet(net.id);
  const notice = useNotice();
  return (
    <NameDialog
      title={text.copyNetOf(net.name)}
      lead={text.copyLead}
      initial={text.copyName(net.name)}
      submitLabel={text.makeCopy}
      error={copy.error}
      busy={copy.isPending}
      onClose={onClose}
      onSubmit={(name) =>
        copy.mutate(name, {
          onSuccess: () => {
            notice(text.copied);
            onClose();
          },
        })
      }
    />
  );
}

function RenameDialog({ net, onClose }: { net: NetSummary; onClose: () => void }) {
  const rename = useRenameNet(net.id);
  return (
    <NameDialog
      title={text.renameNetOf(net.name)}
      initial={net.name}
      submitLabel={text.saveName}
      error={rename.error}
      busy={rename.isPending}
      onClose={onClose}
      onSubmit={(name) => rename.mutate(name, { onSuccess: onClose })}
    />
  );
}

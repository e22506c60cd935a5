import { buttonClass } from '#client/components/button.tsx';
import { Menu, menuItemClass } from '#client/components/menu.tsx';
import { downloadsText as text } from '#client/text/downloads.ts';

/** What may be taken out of a net as a file. */
export type NetDownload = 'schedule' | 'traces' | 'net';
const ALL: readonly NetDownload[] = ['schedule', 'traces', 'net'];

interface DownloadMenuProps {
  /** Whether the section is set out, without which traces have no offsets and elevations. */
  canDraw: boolean;
  onDownload: (what: NetDownload) => void;
}

/** The files of a net, of which the traces are offered once the section is set out. */
export function DownloadMenu({ canDraw, onDownload }: DownloadMenuProps) {
  return (
    <Menu
      label={text.label}
      button={text.button}
      buttonClassName={buttonClass('quiet', 'px-2 py-[2px] text-sm')}
    >
      {(close) =>
        ALL.map((what) => {
          const isWithheld = what === 'traces' && !canDraw;
          return (
            <button
              key={what}
              type="button"
              disabled={isWithheld}
              className={`${menuItemClass} disabled:text-ink-2`}
              onClick={() => {
                close();
                onDownload(what);
              }}
            >
              <span>
                {text[what]}
                {isWithheld ? <span className="block text-sm">{text.notSetOut}</span> : null}
              </span>
            </button>
          );
        })
      }
    </Menu>
  );
}

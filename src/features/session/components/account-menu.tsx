import { Link } from 'react-router-dom';
import { Menu, menuItemClass } from '#client/components/menu.tsx';
import { initialsOf } from '#client/lib/initials.ts';
import { paths } from '#client/lib/paths.ts';
import { accountMenuText as text } from '#client/text/account-menu.ts';
import { registerLinkText } from '#client/text/register-links.ts';
import { signOut } from '../api/sign-out.ts';
import { useSession } from '../hooks/use-session.ts';

/** The initials at the right of the top bar and what lies behind them. */
export function AccountMenu() {
  const session = useSession();
  if (!session.person) return null;
  const { person } = session;
  return (
    <Menu
      label={text.accountMenu(initialsOf(person.name), person.name)}
      button={initialsOf(person.name)}
      buttonClassName="grid size-7 min-h-0 place-items-center rounded-full border border-ink bg-film text-xs font-semibold pointer-coarse:size-10"
    >
      {(close) => (
        <>
          <p className="m-0 border-b border-rule-2 px-3 pt-1 pb-2 break-words">
            <b className="block font-semibold">{person.name}</b>
            <span className="text-sm text-ink-2">
              {person.email}
              {person.admin ? `, ${text.admin}` : ''}
            </span>
          </p>
          <MenuLink to={paths.register()} label={registerLinkText.menu} onClick={close} />
          <MenuLink to={paths.account} label={text.accountTitle} onClick={close} />
          {session.can.includes('people.manage') ? (
            <MenuLink to={paths.people} label={text.people} onClick={close} />
          ) : null}
          {session.outboxReadable || session.can.includes('mail.read') ? (
            <MenuLink to={paths.mails} label={text.mails} onClick={close} />
          ) : null}
          <button type="button" className={menuItemClass} onClick={signOut}>
            {text.signOut}
          </button>
        </>
      )}
    </Menu>
  );
}

const MenuLink = ({ to, label, onClick }: { to: string; label: string; onClick: () => void }) => (
  <Link to={to} className={menuItemClass} onClick={onClick}>
    {label}
  </Link>
);

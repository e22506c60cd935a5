import { createElement } from 'react';

const ADDRESS = /(https?:\/\/[^\s<>"]+)/;

const OWN_PAGE = /^\/(dams|drawings|nets|revisions|invitation|reset-password|stop-digest)\b/;

/** A link of this site is taken as a path, so that it opens here whatever PUBLIC_URL says of host and port. */
function hrefOf(address: string): string {
  const url = new URL(address);
  return OWN_PAGE.test(url.pathname) ? `${url.pathname}${url.search}${url.hash}` : address;
}

/**
 * The mail's plain text, in even letters since it holds tables made of spaces, with its links pressed as in a mail
 * program. Only the text is shown: the mail's own HTML is never put into this page. The parts are given as separate
 * children: they never move, so need no keys.
 */
export function MailText({ text }: { text: string }) {
  const parts = text
    .split(ADDRESS)
    .map((part) =>
      ADDRESS.test(part) ? createElement('a', { href: hrefOf(part), rel: 'noreferrer' }, part) : part,
    );
  return createElement(
    'div',
    { className: 'max-w-[90ch] font-mono text-sm break-words whitespace-pre-wrap' },
    ...parts,
  );
}

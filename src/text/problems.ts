import { inLanguage } from './language.ts';

const en = {
  noConnectionTitle: 'No connection',
  noConnection:
    'The server could not be reached. Check the connection and try again; what you typed is still here.',
  unknownReplyTitle: 'The page is out of date',
  unknownReply:
    'The server answered in a way this page does not know. Reload the page; if it happens again, tell the administrator.',
  unreadableReply: 'The server could not do this. Try again; if it happens again, tell the administrator.',
  missingScript:
    'The script of this page could not be fetched: the product was renewed meanwhile, or there is no connection. Reload the page.',
  requestNumber: 'Request number',
  pageFailedTitle: 'This page could not be shown',
  pageFailed:
    'Something in the page went wrong. Reload it; work that was not sent yet is kept in this browser.',
  reload: 'Reload the page',
  tryAgain: 'Try again',
  linkInvalid: 'This link does not work',
  toDams: 'Go to your dams',
  openCheck: 'Open the check',
  notFoundTitle: 'Not found',
  notFound: 'There is nothing at this address, or you have no part on the dam it belongs to.',
  askForPart: 'Ask an engineer of the dam to give you a part on it.',
} as const;
export const problemText = inLanguage({ en });

import { inLanguage } from './language.ts';

/** Words of sending for checking and of the check itself. */
const enSendingText = {
  button: 'Send for checking',
  /** The same on a telephone or tablet, where the bar has no room for more. */
  short: 'Send',
  title: (label: string) => `Send for checking as revision ${label}`,
  lead: 'The net and its figures are frozen as they stand and kept. The reviewers get a mail with a link.',
  unsaved: 'Some changes are not saved yet. They are sent first.',
  unsavedBlocked:
    'Some changes could not be saved, so nothing can be sent. Close this, and see to the saving state at the top.',
  loading: 'Looking for what is still missing…',
  reviewer: 'Reviewers',
  allHaveToAccept: 'It is accepted when all of them have accepted, and returned when one returns it.',
  dueOn: 'Wanted by',
  dueOnHint: 'May stay empty. The reviewers are reminded on the day before and once when it has passed.',
  drew: 'drew this net, so cannot check it',
  noReviewers:
    'Nobody else on this dam is a reviewer. Ask an engineer or the administrator to give somebody that part.',
  chooseReviewer: 'Choose who is to check it.',
  missing: 'Still open on the net',
  nothingMissing: 'Nothing is missing.',
  openLead: 'Settle it on the desk, or say why it stays. The reasons are frozen with the revision.',
  reasonFor: (text: string) => `Reason why this stays: ${text}`,
  reasonHint: 'Reason why it stays',
  reasonsNeeded: (count: number) =>
    count === 1 ? 'One reason is still missing.' : `${count} reasons are still missing.`,
  reasonForRest: 'Use this reason for all without one',
  blindFirst: 'Ask for a blind reading first',
  blindFirstHint:
    'The reviewers may always read points on the net alone before they see the figures. When it is asked for, the mail tells no figures either.',
  message: 'Message to the reviewer',
  messageHint: 'May stay empty.',
  send: 'Send',
  sent: (label: string, name: string) => `Revision ${label} has been sent to ${name}.`,
} as const;
export const sendingText = inLanguage({ en: enSendingText });

const enCheckText = {
  crumb: (label: string) => `Revision ${label}`,
  heading: (label: string) => `Revision ${label}`,
  frozen: 'Frozen when it was sent; later changes to the net do not appear here.',
  sentBy: (name: string, moment: string) => `Sent by ${name}, ${moment}`,
  to: (name: string) => `to ${name}`,
  drawnBy: 'Drawn by',
  message: 'Message',
  stayedOpenTitle: 'Left open when it was sent',
  stayedOpenNone: 'Nothing was open.',
  stayedOpenUnasked: 'Sent before this was asked for.',
  reason: 'Reason',
  decisionTitle: 'Check',
  accept: 'Accept',
  acceptWithNotes: 'Accept with notes',
  return: 'Return',
  acceptLead: 'Accepting says that you have checked the net and its figures and stand for them.',
  note: 'Note to the engineer',
  noteForReturn: 'Needed to return it, and to accept it with notes.',
  noteNeeded: 'Say what has to be done, or with which notes it is accepted.',
  capacity: 'In what capacity you sign',
  capacityHint: 'For example “Senior dam engineer, CEng”. It is kept with your name and the time.',
  capacityNeeded: 'Say in what capacity you sign.',
  password: 'Your password, to sign',
  passwordNeeded: 'Enter your password to sign.',
  signedAs: (capacity: string) => `Signed as ${capacity}`,
  superseded: (label: string) => `Superseded by revision ${label}, which was accepted later.`,
  supersededShort: (label: string) => `superseded by ${label}`,
  withdrawAcceptance: 'Withdraw the acceptance',
  withdrawAcceptanceLead:
    'A record is added that the acceptance was wrong, and why. The revision and its acceptance stay to be read.',
  withdrawSending: 'Withdraw from checking',
  withdrawSendingLead:
    'The reviewers are told that nothing more is asked of them. The revision and its letter stay in the list.',
  reasonNeeded: 'Say why.',
  dueOn: 'Wanted by',
  records: {
    accepted: (name: string, moment: string) => `Accepted by ${name}, ${moment}`,
    acceptedWithNotes: (name: string, moment: string) => `Accepted with notes by ${name}, ${moment}`,
    returned: (name: string, moment: string) => `Returned by ${name}, ${moment}`,
    acceptanceWithdrawn: (name: string, moment: string) => `Acceptance withdrawn by ${name}, ${moment}`,
    sendingWithdrawn: (name: string, moment: string) => `Withdrawn from checking by ${name}, ${moment}`,
  },
  waiting: (name: string) => `Waiting for ${name}`,
  recordTitle: 'Record',
  hash: 'Hash of this record (SHA-256)',
  previous: 'Hash of the revision before',
  first: 'None: this is the first revision of the net.',
  engine: 'Reading engine',
  drawing: 'Drawing',
  drawingHash: 'Hash of the drawing’s file (SHA-256)',
  openNet: 'Open the net',
  historyTitle: 'Revisions of this net',
  historyEmpty: 'This net has not been sent for checking yet.',
  state: {
    waiting: 'waiting',
    accepted: 'accepted',
    acceptedWithNotes: 'accepted with notes',
    returned: 'returned',
    acceptanceWithdrawn: 'acceptance withdrawn',
    withdrawn: 'withdrawn',
  },
  present: 'shown here',
  downloadCsv: 'Download CSV',
  panes: { sheet: 'Sheet', schedule: 'Schedule', notes: 'Notes', check: 'Check' },
} as const;
export const checkText = inLanguage({ en: enCheckText });

/** What the cell "Checked" of the title block says of a revision. */
const enRevisionStateText = {
  waiting: (names: string) => `waiting, ${names}`,
  accepted: (names: string) => `${names}, accepted`,
  acceptedWithNotes: (names: string) => `${names}, accepted with notes`,
  returned: (name: string) => `${name}, returned`,
  acceptanceWithdrawn: (name: string) => `${name}, acceptance withdrawn`,
  withdrawn: (name: string) => `${name}, withdrawn`,
} as const;
export const revisionStateText = inLanguage({ en: enRevisionStateText });

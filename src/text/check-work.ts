import { inLanguage } from './language.ts';

/** Words of what a reviewer does before deciding: reading blind, ticking figures, answering the check list. */
const enBlind = {
  title: (label: string) => `Read revision ${label} blind`,
  lead: 'Read some of the points on the net alone, before you see the engineer’s figures. The two readings are then kept side by side in the record.',
  asked: (name: string) => `${name} asks you to read blind first.`,
  mailed:
    'The mail about this revision told the main figures. If you have read them there, a blind reading says little; the record tells that they were mailed.',
  notMailed: 'The mail about this revision told no figures.',
  given: 'What a reading needs',
  headwater: 'Headwater',
  tailwater: 'Tailwater',
  noTailwater: 'none',
  notGiven: 'not given',
  gammaW: 'Unit weight of water, γw',
  drops: 'Drops of the whole net, Nd, by your count',
  dropsHint: 'Needed for points of which you count the drops.',
  outletHead: 'Head at the outlet you count to',
  points: 'Points',
  pointsLead: 'Choose those you read. Place a point on the sheet, or enter its elevation.',
  noPoints: 'This revision has no points to read. Open the figures to check it.',
  showPlaces: 'Show where the points lie',
  showPlacesHint: 'Shows their places without figures. The record tells that you asked.',
  placesShown: 'The marks on the sheet show where the engineer has the points.',
  own: (name: string) => `${name}, own`,
  unnamed: 'unnamed point',
  read: (name: string) => `Read ${name}`,
  place: 'Place on the sheet',
  placeOf: (name: string) => `Place ${name} on the sheet`,
  placeAgain: 'Place again',
  placing: (name: string) => `Press where ${name} lies. Escape leaves it.`,
  fields: {
    offset: 'Offset',
    elevation: 'Elevation z',
    drops: 'Drops lost',
    head: 'or total head',
    remark: 'Remark',
  },
  fieldOf: (field: string, name: string) => `${field} of ${name}`,
  gives: (head: string, pressure: string) => `h ${head}, u ${pressure}`,
  givesNothing: 'No pressure yet: enter z, and the drops lost or the head.',
  above: 'above the water',
  seal: 'Seal the reading and show the figures',
  sealLead: 'Once sealed, the reading cannot be changed or taken back.',
  chooseOne: 'Choose at least one point.',
  incomplete: (names: string) => `Still to be read: ${names}.`,
  notNumber: (field: string, name: string) => `${field} of ${name} is no number.`,
  decline: 'Show the figures without reading blind',
  declineTitle: 'Show the figures?',
  declineLead:
    'From then on this revision cannot be read blind by you any more. The record tells when you opened the figures.',
  declineDo: 'Show the figures',
  kept: 'What you enter is kept in this browser until you seal it.',
  panes: { sheet: 'Sheet', reading: 'Reading' },
} as const;
export const blindText = inLanguage({ en: enBlind });

const enBeside = {
  title: 'Read blind',
  by: (name: string, moment: string) => `By ${name}, ${moment}`,
  point: 'Point',
  own: 'Blind',
  net: 'Engineer',
  difference: 'Difference',
  quantities: { offset: 'offset', elevation: 'z', dropsLost: 'drops', totalHead: 'h', porePressure: 'u' },
  unnamed: 'unnamed',
  within: (half: string) => `within ± ${half}`,
  beyond: (half: string) => `beyond ± ${half}`,
  drops: (own: string, net: string) => `Drops Nd: ${own} by the blind count, ${net} by the engineer.`,
  legend: (length: string, pressure: string) =>
    `Lengths and heads in ${length}, pressures in ${pressure}. ± are the engineer’s, 95 %.`,
} as const;
export const besideText = inLanguage({ en: enBeside });

const enCheckWork = {
  figures: 'Figures checked',
  ticked: (count: number, all: number) => `${count} of ${all} ticked`,
  tickLead:
    'Tick a figure in the schedule, the title block or below once you have checked it. Arrow keys go from tick to tick, Space ticks.',
  tick: (of: string, what: string) => `Checked: ${of}, ${what}`,
  further: 'Profiles, seepage and stability',
  tickAll: 'Tick all of these',
  tickRow: (of: string) => `Tick all of ${of}`,
  saving: 'Saving…',
  kept: 'Ticks and answers are kept on the server until you decide.',
  list: 'Check list',
  answered: (count: number, all: number) => `${count} of ${all} answered`,
  listEmpty: 'This dam has no check list.',
  answers: { yes: 'Yes', no: 'No', notApplicable: 'Does not apply' },
  remark: 'Remark',
  remarkOn: (item: string) => `Remark on: ${item}`,
  addRemark: 'Add a remark',
  noNeedsRemark: 'To accept all the same, say in a remark why.',
  unanswered: (count: number) =>
    count === 1
      ? 'One item of the check list is not answered. Answer it before you accept, if need be with “does not apply”.'
      : `${count} items of the check list are not answered. Answer them before you accept, if need be with “does not apply”.`,
  bare: 'An item is answered with no and has no remark. Say there why it can be accepted all the same.',
  record: 'Check before the decision',
  opened: (name: string, moment: string) => `Figures opened by ${name}, ${moment}, without reading blind`,
  checkedBy: (name: string) => `Check of ${name}`,
  notTicked: 'Not ticked',
  allTicked: 'All figures are ticked.',
  answerNone: 'not answered',
  hash: 'Hash of this record (SHA-256)',
} as const;
export const checkWorkText = inLanguage({ en: enCheckWork });

const enCheckListSettings = {
  title: 'Check list for reviewers',
  lead: 'Each reviewer answers every item before accepting a revision. The list and the answers are frozen with the decision.',
  usual: 'This is the usual list. It becomes this dam’s own when you change it.',
  item: (n: number) => `Item ${n}`,
  add: 'Add an item',
  remove: 'Remove',
  removeItem: (n: number) => `Remove item ${n}`,
  up: 'Up',
  upItem: (n: number) => `Move item ${n} up`,
  save: 'Save the list',
  saved: 'The check list is saved.',
  putBack: 'Put the usual list back',
  discard: 'Discard the changes',
  empty: 'The list is empty: reviewers of this dam answer nothing.',
  emptyItem: 'Say what is to be checked, or remove the item.',
  changedNote: 'An item whose words are changed has to be answered anew by who is checking now.',
} as const;
export const checkListSettingsText = inLanguage({ en: enCheckListSettings });

import { inLanguage } from './language.ts';

/** Words of the title block. A cell's fault is said here in a word or two; the whole sentence is the finding's own. */
const en = {
  name: 'Title block',
  labels: {
    section: 'Section',
    dam: 'Dam',
    scale: 'Scale',
    residual: 'Residual',
    headwater: 'Headwater',
    tailwater: 'Tailwater',
    outlet: 'Outlet',
    drain: 'Drain',
    outflowFace: 'Outflow face',
    drops: 'Drops',
    channels: 'Channels',
    tracedChannels: 'Traced channels',
    headPerDrop: 'Head per drop',
    permeability: 'Permeability',
    seepagePerMetre: 'Seepage per metre',
    seepagePerFoot: 'Seepage per foot',
    netCheck: 'Net check',
    drawn: 'Drawn',
    checked: 'Checked',
    calculation: 'Calculation',
  },
  /** The label says "Section" already, and many sections are named so. */
  sectionAt: (section: string, chainage: string) => {
    const name = section.replace(/^section\s+/i, '');
    return chainage === '' ? name : `${name} at chainage ${chainage}`;
  },
  perPixel: (figure: string, unit: string) => `${figure} ${unit}/px`,
  knownPointsNeeded: 'Known points needed',
  upUnclear: 'Which way is up?',
  residualNone: 'None, two points only',
  placeDoubt: (middle: string, corner: string, unit: string) =>
    `; places ± ${middle}${middle === corner ? '' : ` to ${corner}`}\u00a0${unit}`,
  residualLater: 'Not to scale yet',
  levelNeeded: 'Level needed',
  outletNeeded: 'Outlet needed',
  drainEmpty: (level: string) => `${level}, empty`,
  drainUnderPressure: (level: string) => `${level}, under pressure`,
  ownElevation: 'its own elevation',
  alongIt: 'empty, its own elevation',
  dropsNeeded: 'Needed',
  dropsTraced: (count: string) => `${count} traced`,
  /** The other cells say that the net is unfinished; here only a count that differs is worth a word. */
  dropsStated: (stated: string, traced: string | null) =>
    traced === null || traced === stated ? `${stated} stated` : `${stated} stated, ${traced} traced`,
  /** With outlets at several heads each has its own count. */
  dropsToEach: (outlets: ReadonlyArray<{ label: string; drops: string }>) =>
    outlets.map(({ label, drops }) => `${drops} to ${label}`).join(', '),
  channelsNone: 'None',
  unequal: 'Unequal intervals',
  notYet: 'Net unfinished',
  permeabilityNeeded: 'Value needed',
  seepageNeeds: 'Permeability needed',
  seepageNeedsChannels: 'Channels needed',
  tracedChannelsOnly: 'traced channels only',
  within: (factor: string) => `, ×/÷ ${factor}`,
  checkNothing: 'Nothing found',
  checkMore: (first: string, more: number) => (more === 0 ? first : `${first} And ${more} more.`),
  checkSummary: (summary: string, others: number) =>
    others === 0 ? summary : `${summary}, ${others} other ${others === 1 ? 'question' : 'questions'}`,
  notDrawn: 'Nobody yet',
  checkedBy: {
    draft: 'not sent',
    sent: (name: string) => `waiting, ${name}`,
    accepted: (name: string) => `${name}, accepted`,
    returned: (name: string) => `${name}, returned`,
    changedSince: (told: string) => `${told}; changed since`,
  },
  revisions: (count: number) => (count === 0 ? 'none' : String(count)),
  state: { missing: 'incomplete', wrong: 'wrong', question: 'check this', ok: '' },
  step: {
    section: 'Show the load case',
    dam: 'Go to the dam',
    scale: 'Set out the section',
    residual: 'Add a check point',
    headwater: 'Enter the water levels',
    outlet: 'Enter the outlet levels',
    drops: 'State the count',
    channels: 'State the count',
    headPerDrop: 'State the count',
    permeability: 'Enter the permeability',
    seepage: 'Show what the seepage is made of',
    netCheck: 'Show the net check and the independent solution',
    drawn: 'Show the revisions',
    checked: 'Show the revisions',
    calculation: 'Show the revisions',
  },
} as const;
export const titleBlockText = inLanguage({ en });

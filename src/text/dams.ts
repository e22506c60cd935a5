import type { DamRole } from '#shared/contract/actions.ts';
import { inLanguage } from './language.ts';

const ROLE_NAMES: Record<DamRole, string> = {
  engineer: 'engineer',
  reviewer: 'reviewer',
  colleague: 'colleague',
};
const ROLE_TASKS: Record<DamRole, string> = {
  engineer: 'uploads, calibrates, traces, sends for checking',
  reviewer: 'comments, checks, accepts or returns',
  colleague: 'reads and comments',
};

const plural = (count: number, one: string, many: string) => `${count} ${count === 1 ? one : many}`;
const withArticle = (role: string) => `${/^[aeiou]/.test(role) ? 'an' : 'a'} ${role}`;

const en = {
  title: 'Dams',
  yours: 'Your dams',
  dam: 'Dam',
  fullSupply: 'Full supply level',
  drawings: 'Drawings',
  openNotes: 'Open notes',
  yourPart: 'Your part',
  newDam: 'New dam',
  none: 'You have no part on any dam yet. Ask an engineer of your dam to add you.',
  noneAdmin: 'There is no dam yet. Make the first one, then add its people.',
  nonePutAway: 'No dam has been put away.',
  showPutAway: 'Show what was put away',
  hidePutAway: 'Show what is in use',
  putAwayMark: 'put away',
  role: (role: DamRole) => ROLE_NAMES[role],
  roleTask: (role: DamRole) => ROLE_TASKS[role],
  roles: (roles: readonly DamRole[]) => roles.map((role) => ROLE_NAMES[role]).join(', '),
  youAre: (roles: readonly DamRole[]) =>
    roles.length === 0
      ? 'You have no part on this dam.'
      : `You are ${roles.map((role) => withArticle(ROLE_NAMES[role])).join(' and ')} on this dam.`,
  drawingCount: (count: number) => plural(count, 'drawing', 'drawings'),
  unreadNoteCount: (count: number) => `${count} new to you`,
  openNoteCount: (count: number) => `${plural(count, 'note', 'notes')} open`,
  levelUnset: 'not entered',
  siUnits: 'SI units',
  usUnits: 'US customary units',

  settings: 'Settings and people',
  people: 'People',
  invited: 'invited, not yet accepted',
  managePeople: 'Manage people',
  noPeople: 'Nobody has a part on this dam yet.',
  isPutAway: 'This dam was put away. It can be read, not changed.',

  activity: 'Activity',
  activityOf: (name: string) => `${name}: activity`,
  allActivity: 'All activity',
} as const;
export const damsText = inLanguage({ en });

import { inLanguage } from './language.ts';

/** Words of taking a dam out as a whole and bringing it back elsewhere. */
const en = {
  title: 'Archive',
  lead: 'Everything of this dam in one ZIP file: originals, traces, readings, notes, revisions, calculation sheets, activity and who took part, with a hash of each. It can be restored into another installation.',
  download: 'Download archive',
  restoreTitle: 'Restore a dam from an archive',
  restoreLead:
    'The archive is held against its hashes before anything is written. People who are not here yet are entered without a password; let them in under People.',
  file: 'Archive (ZIP)',
  fileNeeded: 'Choose the archive first.',
  restore: 'Restore the dam',
  checking: 'Sending, checking and restoring. A large archive takes some minutes; keep this page open.',
  done: (name: string) => `${name} is restored. Its sheets are being prepared.`,
} as const;
export const archivesText = inLanguage({ en });

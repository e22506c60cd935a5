import { People1796126400001 } from './1796126400001-people.ts';
import { DamsAndEvents1796126400002 } from './1796126400002-dams-and-events.ts';
import { Drawings1796126400003 } from './1796126400003-drawings.ts';
import { Nets1796126400004 } from './1796126400004-nets.ts';
import { Notes1796126400005 } from './1796126400005-notes.ts';
import { Ledger1796126400006 } from './1796126400006-ledger.ts';
import { OutboxMail1796126400007 } from './1796126400007-outbox-mail.ts';
import { ApplicationRole1796126400008 } from './1796126400008-application-role.ts';
import { NetCopiedFrom1796126400009 } from './1796126400009-net-copied-from.ts';
import { RevisionChangeNumber1796126400010 } from './1796126400010-revision-change-number.ts';
import { SignInFailures1796126400011 } from './1796126400011-sign-in-failures.ts';
import { DocumentVersion21796126400013 } from './1796126400013-document-version-2.ts';
import { CalculationSheets1796126400060 } from './1796126400060-calculation-sheets.ts';
import { FirstView1796126400100 } from './1796126400100-first-view.ts';
import { Renditions1796126400110 } from './1796126400110-renditions.ts';
import { DocumentVersion31796126400111 } from './1796126400111-document-version-3.ts';
import { NetPresence1796126400120 } from './1796126400120-net-presence.ts';
import { NoteThreads1796126400130 } from './1796126400130-note-threads.ts';
import { SignedDecisions1796126400140 } from './1796126400140-signed-decisions.ts';
import { ReviewersRecords1796126400141 } from './1796126400141-reviewers-records.ts';
import { MailDigests1796126400154 } from './1796126400154-mail-digests.ts';
import { Register1796126400157 } from './1796126400157-register.ts';

/** In the order they run. */
export const migrations = [
  People1796126400001,
  DamsAndEvents1796126400002,
  Drawings1796126400003,
  Nets1796126400004,
  Notes1796126400005,
  Ledger1796126400006,
  OutboxMail1796126400007,
  ApplicationRole1796126400008,
  NetCopiedFrom1796126400009,
  RevisionChangeNumber1796126400010,
  SignInFailures1796126400011,
  DocumentVersion21796126400013,
  CalculationSheets1796126400060,
  FirstView1796126400100,
  Renditions1796126400110,
  DocumentVersion31796126400111,
  NetPresence1796126400120,
  NoteThreads1796126400130,
  SignedDecisions1796126400140,
  ReviewersRecords1796126400141,
  MailDigests1796126400154,
  Register1796126400157,
];

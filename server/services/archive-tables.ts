import { originalKey } from '#server/storage/storage-keys.ts';

/** A row as PostgreSQL writes it as JSON. */
export type ArchivedRow = Record<string, unknown>;

export interface ArchivedTable {
  name: string;
  /** Which rows belong to the dam `$1`. */
  where: string;
  /** Columns of the primary key, or what puts rows before those that refer to them. */
  order: string;
  /** Of the ledger, whose rows are never changed on the way, not even by a person's other id. */
  isLedger?: true;
  /** The stored file that a row refers to; null when it has none. */
  fileOf?: (row: ArchivedRow) => string | null;
}

const IN_DRAWINGS = 'drawing_id IN (SELECT id FROM drawing WHERE dam_id = $1)';
const IN_SHEETS = `sheet_id IN (SELECT id FROM sheet WHERE ${IN_DRAWINGS})`;
const IN_SECTIONS = `section_id IN (SELECT id FROM section WHERE ${IN_SHEETS})`;
const IN_NETS = `net_id IN (SELECT id FROM net WHERE ${IN_SECTIONS})`;
const IN_NOTES = `note_id IN (SELECT id FROM note WHERE ${IN_NETS})`;
const IN_ENTRIES = `entry_id IN (SELECT id FROM note_entry WHERE ${IN_NOTES})`;
const IN_REVISIONS = `revision_id IN (SELECT id FROM revision WHERE ${IN_NETS})`;

const original = ({ sha256 }: ArchivedRow) => originalKey(String(sha256));
const stored = ({ storage_key }: ArchivedRow) => (typeof storage_key === 'string' ? storage_key : null);

/**
 * Every table of a dam, in the order in which its rows can be entered again. A test holds this and `LEFT_OUT` against
 * the schema: a new table has to be thought about.
 */
export const ARCHIVED_TABLES: readonly ArchivedTable[] = [
  { name: 'dam', where: 'id = $1', order: 'id' },
  { name: 'membership', where: 'dam_id = $1', order: 'dam_id, person_id' },
  { name: 'drawing', where: 'dam_id = $1', order: 'id', fileOf: original },
  { name: 'render_job', where: IN_DRAWINGS, order: 'id' },
  { name: 'sheet', where: IN_DRAWINGS, order: 'id' },
  { name: 'rendition', where: IN_SHEETS, order: 'id' },
  { name: 'section', where: IN_SHEETS, order: 'id' },
  // A copy comes after the net that it was made of.
  { name: 'net', where: IN_SECTIONS, order: 'created_at, id' },
  {
    name: 'document_entity',
    where: `${IN_NETS} OR ${IN_SECTIONS}`,
    order: 'owner_id, entity_id',
  },
  { name: 'command_batch', where: IN_NETS, order: 'net_id, client_id, seq' },
  { name: 'note', where: IN_NETS, order: 'id' },
  { name: 'note_entry', where: IN_NOTES, order: 'id' },
  { name: 'note_entry_earlier', where: IN_ENTRIES, order: 'id' },
  { name: 'note_file', where: IN_NETS, order: 'id', fileOf: original },
  { name: 'note_read', where: IN_NOTES, order: 'note_id, person_id' },
  // The chain of each net from its first revision on.
  { name: 'revision', where: IN_NETS, order: 'net_id, number', isLedger: true },
  { name: 'decision', where: IN_REVISIONS, order: 'decided_at, id', isLedger: true },
  { name: 'review_reminder', where: IN_REVISIONS, order: 'id' },
  // The chain of each revision from its first record on.
  { name: 'review_record', where: IN_REVISIONS, order: 'revision_id, number', isLedger: true },
  { name: 'check_draft', where: IN_REVISIONS, order: 'revision_id, person_id' },
  { name: 'artifact', where: IN_REVISIONS, order: 'id', isLedger: true, fileOf: stored },
  { name: 'calculation_sheet', where: IN_NETS, order: 'id', fileOf: stored },
  { name: 'event', where: 'dam_id = $1', order: 'at, id' },
];

/** What no archive holds, and why. */
export const LEFT_OUT: Record<string, string> = {
  person: 'people are named apart, without what they sign in with',
  person_token: 'invitations and resets of passwords end with the installation',
  session: 'sign-ins end with the installation',
  sign_in_failure: 'counts of wrong passwords end with the installation',
  outbox_mail: 'a mail is sent once, by the installation that wrote it',
  mail_digest: 'how an installation mails its people is its own',
  net_presence: 'who has a net open now',
  register_entry: 'worked out of the other tables as their rows are entered',
  register_stale: 'drawings of which a transaction has still to bring the register up to date',
  migration: 'the state of the schema itself',
};

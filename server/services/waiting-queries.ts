import type { EntityManager } from 'typeorm';
import type { WaitingDto } from '#shared/contract/dams.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { drawingTitle } from './drawing-title.ts';
import { placeOfNet } from './net-place.ts';
import { readingIfAny } from './schedule-queries.ts';
import { isUnreadBy } from './unread-notes.ts';

export type WaitingItem = WaitingDto['items'][number];

/** Unfinished nets and bare drawings shown at most, newest first: a list of hundreds would say nothing. */
const MOST_OF_A_KIND = 10;

interface NetRow {
  dam_id: string;
  dam_name: string;
  drawing_id: string;
  number: string;
  title: string;
  file_name: string;
  section_name: string;
  net_id: string;
  net_name: string;
  at: Date;
}
interface RevisionRow extends NetRow {
  revision_id: string;
  label: string;
  person_name: string;
}
interface NotesRow extends NetRow {
  note_id: string;
  /** Notes that wait. */
  waiting: number;
}
interface AnswerRow extends NotesRow {
  to_answer: number;
  answered: number;
  must: number;
}

/** Nets in use on the reader's dams, with the newest revision of each. $1 = reader. */
const NETS = `
  FROM membership m JOIN dam d ON d.id = m.dam_id AND d.archived_at IS NULL
  JOIN drawing w ON w.dam_id = d.id AND w.archived_at IS NULL
  JOIN sheet s ON s.drawing_id = w.id
  JOIN section c ON c.sheet_id = s.id AND c.archived_at IS NULL
  JOIN net n ON n.section_id = c.id AND n.archived_at IS NULL
  LEFT JOIN LATERAL (SELECT v.* FROM revision v WHERE v.net_id = n.id ORDER BY v.number DESC LIMIT 1) r ON true`;
const NET_COLUMNS = `d.id AS dam_id, d.name AS dam_name, w.id AS drawing_id, w.number, w.title, w.file_name,
  c.name AS section_name, n.id AS net_id, n.name AS net_name`;
/** The reader started the net or changed it. */
const DREW = `(n.created_by = $1 OR EXISTS (SELECT 1 FROM command_batch b WHERE b.net_id = n.id AND b.person_id = $1))`;

const titleOf = (row: NetRow) => `${sectionTitle(row.section_name)}, ${row.net_name}`;

function itemOf(
  kind: WaitingItem['kind'],
  row: NetRow,
  words: Pick<WaitingItem, 'text'> &
    Partial<Pick<WaitingItem, 'detail' | 'revisionId' | 'noteId' | 'dueOn' | 'mustAnswer'>>,
): WaitingItem {
  const drawing = drawingTitle({ number: row.number, title: row.title, fileName: row.file_name });
  return {
    kind,
    text: words.text,
    detail: [drawing, words.detail].filter(Boolean).join(', '),
    damId: row.dam_id,
    damName: row.dam_name,
    drawingId: row.drawing_id,
    netId: row.net_id,
    revisionId: words.revisionId ?? null,
    noteId: words.noteId ?? null,
    dueOn: words.dueOn ?? null,
    mustAnswer: words.mustAnswer ?? false,
    at: row.at.toISOString(),
  };
}

async function toCheck(manager: EntityManager, personId: string): Promise<WaitingItem[]> {
  const rows: Array<RevisionRow & { due_on: string | null }> = await manager.query(
    `SELECT ${NET_COLUMNS}, r.id AS revision_id, r.label, r.sent_at AS at, r.due_on::text, p.name AS person_name
      ${NETS} JOIN person p ON p.id = r.sent_by
      WHERE m.person_id = $1 AND 'reviewer' = ANY (m.roles) AND $1 = ANY (r.reviewer_ids)
        AND revision_state(r.id) = 'waiting'
        AND NOT EXISTS (SELECT 1 FROM decision e WHERE e.revision_id = r.id AND e.decided_by = $1)`,
    [personId],
  );
  return rows.map((row) =>
    itemOf('check', row, {
      text: `Check revision ${row.label} of ${titleOf(row)}`,
      detail: `sent by ${row.person_name}`,
      revisionId: row.revision_id,
      dueOn: row.due_on,
    }),
  );
}

async function toRevise(manager: EntityManager, personId: string): Promise<WaitingItem[]> {
  const rows: Array<RevisionRow & { decision: string }> = await manager.query(
    `SELECT ${NET_COLUMNS}, r.id AS revision_id, r.label, e.decided_at AS at, e.decision, p.name AS person_name
      ${NETS} JOIN decision e ON e.revision_id = r.id AND e.decision IN ('returned', 'acceptanceWithdrawn') JOIN person p ON p.id = e.decided_by
      WHERE m.person_id = $1 AND 'engineer' = ANY (m.roles) AND r.sent_by = $1`,
    [personId],
  );
  return rows.map((row) =>
    itemOf('returned', row, {
      text: `Revise ${titleOf(row)}`,
      detail:
        row.decision === 'returned'
          ? `revision ${row.label} was returned by ${row.person_name}`
          : `the acceptance of revision ${row.label} was withdrawn by ${row.person_name}`,
      revisionId: row.revision_id,
    }),
  );
}

/** A note `o` of somebody else on what the reader drew that is open, or the reader's own that somebody answered. */
const TO_ANSWER = `((o.state = 'open' AND o.created_by <> $1 AND ${DREW}) OR (o.state = 'answered' AND o.created_by = $1))`;
/** An entry `e` of a note names the reader, who did not write it. */
const NAMES_READER = `e.named @> ARRAY[$1::uuid] AND e.author_id <> $1`;
const NEWEST_NOTE = '(array_agg(o.id ORDER BY o.created_at DESC))[1] AS note_id';

/** One item for each net. */
async function toAnswer(manager: EntityManager, personId: string): Promise<WaitingItem[]> {
  const rows: AnswerRow[] = await manager.query(
    `SELECT ${NET_COLUMNS}, a.*
      ${NETS} JOIN LATERAL (
        SELECT max(o.created_at) AS at, ${NEWEST_NOTE}, count(*)::int AS waiting,
          count(*) FILTER (WHERE o.state = 'open')::int AS to_answer,
          count(*) FILTER (WHERE o.state = 'answered')::int AS answered,
          count(*) FILTER (WHERE o.state = 'open' AND o.must_answer_at IS NOT NULL)::int AS must
        FROM note o WHERE o.net_id = n.id AND ${TO_ANSWER}
      ) a ON a.at IS NOT NULL
      WHERE m.person_id = $1`,
    [personId],
  );
  return rows.map((row) =>
    itemOf('answer', row, {
      text: answerText(row),
      detail: [row.net_name, mustText(row)].filter(Boolean).join(', '),
      noteId: row.note_id,
      mustAnswer: row.must > 0,
    }),
  );
}

function answerText({ to_answer: open, answered, section_name: name }: AnswerRow): string {
  const on = sectionTitle(name);
  if (open > 0) return `Answer ${open === 1 ? 'a note' : `${open} notes`} on ${on}`;
  return `Read the answer to ${answered === 1 ? 'your note' : `${answered} notes of yours`} on ${on}`;
}

const mustText = ({ must, to_answer: open }: AnswerRow) =>
  must === 0 ? '' : `${open === 1 ? 'it' : must} must be answered before acceptance`;

/**
 * Notes that name the reader, until the reader has written in them or read the answer of somebody else; but for those
 * that wait for an answer anyway.
 */
async function namedIn(manager: EntityManager, personId: string): Promise<WaitingItem[]> {
  const rows: Array<NotesRow & { author: string }> = await manager.query(
    `SELECT ${NET_COLUMNS}, a.*
      ${NETS} JOIN LATERAL (
        SELECT max(e.created_at) AS at, ${NEWEST_NOTE}, count(DISTINCT o.id)::int AS waiting,
          (array_agg(p.name ORDER BY e.created_at DESC))[1] AS author
        FROM note o JOIN note_entry e ON e.note_id = o.id JOIN person p ON p.id = e.author_id
        WHERE o.net_id = n.id AND ${NAMES_READER} AND o.state <> 'closed' AND NOT ${TO_ANSWER}
          AND NOT (o.state = 'answered' AND NOT ${isUnreadBy('$1')})
          AND NOT EXISTS (SELECT 1 FROM note_entry l
            WHERE l.note_id = o.id AND l.author_id = $1 AND (l.created_at, l.id) > (e.created_at, e.id))
      ) a ON a.at IS NOT NULL
      WHERE m.person_id = $1`,
    [personId],
  );
  return rows.map((row) => {
    const notes = row.waiting === 1 ? 'the note that names' : `${row.waiting} notes that name`;
    return itemOf('named', row, {
      text: `Answer ${notes} you on ${sectionTitle(row.section_name)}`,
      detail: `${row.net_name}, by ${row.author}`,
      noteId: row.note_id,
    });
  });
}

/**
 * What is new in notes on nets in which the reader takes part, by drawing, checking or writing there, and is not told
 * of as something to answer.
 */
async function toRead(manager: EntityManager, personId: string): Promise<WaitingItem[]> {
  const rows: NotesRow[] = await manager.query(
    `SELECT ${NET_COLUMNS}, a.*
      ${NETS} JOIN LATERAL (
        SELECT max(o.created_at) AS at, ${NEWEST_NOTE}, count(*)::int AS waiting
        FROM note o WHERE o.net_id = n.id AND o.state <> 'closed' AND NOT ${TO_ANSWER} AND ${isUnreadBy('$1')}
          AND NOT EXISTS (SELECT 1 FROM note_entry e WHERE e.note_id = o.id AND ${NAMES_READER})
          AND $1 <> (SELECT e.author_id FROM note_entry e WHERE e.note_id = o.id
            ORDER BY e.created_at DESC, e.id DESC LIMIT 1)
      ) a ON a.at IS NOT NULL
      WHERE m.person_id = $1 AND (r.reviewer_ids @> ARRAY[$1::uuid] OR ${DREW} OR EXISTS (
        SELECT 1 FROM note o JOIN note_entry e ON e.note_id = o.id WHERE o.net_id = n.id AND e.author_id = $1))
      ORDER BY a.at DESC LIMIT ${MOST_OF_A_KIND}`,
    [personId],
  );
  return rows.map((row) =>
    itemOf('unread', row, {
      text: `Read ${row.waiting === 1 ? 'what is new in a note' : `what is new in ${row.waiting} notes`} on ${sectionTitle(row.section_name)}`,
      detail: row.net_name,
      noteId: row.note_id,
    }),
  );
}

/** What the reader draws and has not sent yet, as far as its schedule gives no figures. */
async function toFinish(manager: EntityManager, personId: string): Promise<WaitingItem[]> {
  const rows: NetRow[] = await manager.query(
    `SELECT ${NET_COLUMNS}, n.updated_at AS at ${NETS}
      WHERE m.person_id = $1 AND 'engineer' = ANY (m.roles) AND r.id IS NULL AND ${DREW}
      ORDER BY n.updated_at DESC LIMIT ${MOST_OF_A_KIND}`,
    [personId],
  );
  // Nets that were not read lately are read in threads of their own, several at a time.
  const items = await Promise.all(rows.map((row) => unfinished(manager, row)));
  return items.filter((item) => item !== null);
}

async function unfinished(manager: EntityManager, row: NetRow): Promise<WaitingItem | null> {
  const reading = await readingIfAny(manager, await placeOfNet(manager, row.net_id));
  if (reading && reading.setOut.state !== 'fitted')
    return itemOf('calibrate', row, { text: `Put ${titleOf(row)} to scale` });
  return reading?.state === 'read' ? null : itemOf('trace', row, { text: `Finish ${titleOf(row)}` });
}

/** Drawings the reader uploaded that nobody has begun to work on. */
async function toBegin(manager: EntityManager, personId: string): Promise<WaitingItem[]> {
  const rows: Array<Omit<NetRow, 'net_id' | 'net_name' | 'section_name'>> = await manager.query(
    `SELECT d.id AS dam_id, d.name AS dam_name, w.id AS drawing_id, w.number, w.title, w.file_name,
        w.uploaded_at AS at
      FROM membership m JOIN dam d ON d.id = m.dam_id AND d.archived_at IS NULL
      JOIN drawing w ON w.dam_id = d.id AND w.archived_at IS NULL AND w.uploaded_by = $1
      JOIN render_job j ON j.drawing_id = w.id AND j.state = 'done'
      WHERE m.person_id = $1 AND 'engineer' = ANY (m.roles) AND NOT EXISTS (
        SELECT 1 FROM sheet s JOIN section c ON c.sheet_id = s.id JOIN net n ON n.section_id = c.id
        WHERE s.drawing_id = w.id)
      ORDER BY w.uploaded_at DESC LIMIT ${MOST_OF_A_KIND}`,
    [personId],
  );
  return rows.map((row) => ({
    kind: 'calibrate',
    text: `Put ${drawingTitle({ number: row.number, title: row.title, fileName: row.file_name })} to scale`,
    detail: row.number && row.title ? row.title : '',
    damId: row.dam_id,
    damName: row.dam_name,
    drawingId: row.drawing_id,
    netId: null,
    revisionId: null,
    noteId: null,
    dueOn: null,
    mustAnswer: false,
    at: row.at.toISOString(),
  }));
}

/** What has a day comes first, the nearest before the others; then what must be answered; then the newest. */
function byUrgency(a: WaitingItem, b: WaitingItem): number {
  const LATER = '9999';
  return (
    (a.dueOn ?? LATER).localeCompare(b.dueOn ?? LATER) ||
    Number(b.mustAnswer) - Number(a.mustAnswer) ||
    b.at.localeCompare(a.at)
  );
}

/** What waits for a person over all their dams, most urgent first. */
export async function waitingFor(manager: EntityManager, personId: string): Promise<WaitingItem[]> {
  const kinds = [toCheck, toRevise, toAnswer, namedIn, toRead, toFinish, toBegin];
  const items: WaitingItem[] = [];
  for (const read of kinds) items.push(...(await read(manager, personId)));
  return items.sort(byUrgency);
}

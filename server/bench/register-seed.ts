import pg from 'pg';
import type { ApiClient } from './api-client.ts';
import type { BenchStand } from './bench-stand.ts';

export const DAMS_SEEN = 40;
const DAMS = 50;
export const DRAWINGS_OF_DAM = 500;
const DRAWINGS = DAMS * DRAWINGS_OF_DAM;

/** What titles and notes are made of; every word is in one drawing of seven to one of some hundred. */
const TITLES = [
  'Cross-sections of the embankment',
  'Spillway apron and stilling basin',
  'Long section along the crest',
  'Grout curtain and cut-off trench',
  'Toe drain and relief wells',
  'Piezometers, plan and tips',
  'Outlet works, conduit and valve tower',
];
const NOTES = [
  'The toe drain was cleaned in October and runs clear.',
  'Is the core trench drawn to the as-built depth?',
  'Line 3 meets the blanket at a blunt angle.',
  'Piezometer P14 was replaced and its tip lies 0.40 m higher.',
  'Tailwater of the flood of 1978 was 101.20.',
  'The uplift under the apron agrees with the relief wells.',
  'Which permeability was taken for the gravel?',
  'Seepage at the weir rose after the raising.',
  'Please redraw the last metre below the filter.',
  'Checked against the inclinometer of the left abutment.',
  'The scan is stretched along its right edge.',
];

/** An id by kind and number, valid as a UUIDv7 so that the API takes it. */
const id = (kind: number, number: string) =>
  `('0000000${kind}-0000-7000-8000-' || lpad(to_hex(${number}), 12, '0'))::uuid`;
const pick = (words: readonly string[], number: string) =>
  `(ARRAY[${words.map((word) => `'${word}'`).join(', ')}])[1 + (${number}) % ${words.length}]`;

const dam = (number: string) => id(1, number);
const drawing = (number: string) => id(2, number);
const sheet = (number: string) => id(3, number);
const section = (number: string) => id(4, number);
const net = (number: string) => id(5, number);
const series = (count: number) => `generate_series(0, ${count - 1}) n`;

/** Two drawings of three carry one section, the third two; every section a net, every third section a flood case. */
const SEED = `
  INSERT INTO dam (id, name, unit_system, datum, gamma_w, created_by)
    SELECT ${dam('n')}, 'Dam of the bench ' || n, 'SI', 'LD', 9.81, $1 FROM ${series(DAMS)};
  INSERT INTO membership (dam_id, person_id, roles)
    SELECT ${dam('n')}, $1, ARRAY['engineer'] FROM ${series(DAMS_SEEN)};
  INSERT INTO drawing (id, dam_id, sha256, file_name, media_type, byte_size, number, title, revision, uploaded_by, uploaded_at, archived_at)
    SELECT ${drawing('n')}, ${dam(`n / ${DRAWINGS_OF_DAM}`)}, repeat('0', 64), 'scan-' || n || '.tif', 'image/tiff', 1,
      'BD-' || n / 100 || '/' || lpad((n % 100)::text, 2, '0'), ${pick(TITLES, 'n')}, chr(65 + n % 5), $1,
      timestamptz '2020-01-01' + n * interval '1 hour', CASE WHEN n % 50 = 0 THEN now() END FROM ${series(DRAWINGS)};
  INSERT INTO render_job (id, drawing_id, state) SELECT ${id(6, 'n')}, ${drawing('n')}, 'done' FROM ${series(DRAWINGS)};
  INSERT INTO sheet (id, drawing_id, page_number, width_px, height_px, rendition, tile_size_px, max_zoom, tile_format)
    SELECT ${sheet('n')}, ${drawing('n')}, 1, 9933, 7016, 'none', 512, 5, 'png' FROM ${series(DRAWINGS)};
  INSERT INTO section (id, sheet_id, name, chainage, created_by)
    SELECT ${section('n')}, ${sheet(`n % ${DRAWINGS}`)}, chr(65 + n % 8) || '–' || chr(65 + n % 8), (n % 400)::text, $1
      FROM ${series(Math.ceil((DRAWINGS * 4) / 3))};
  INSERT INTO net (id, section_id, name, unit_system, created_by, updated_at)
    SELECT ${net('n')}, ${section(`n % ${Math.ceil((DRAWINGS * 4) / 3)}`)},
      CASE WHEN n < ${Math.ceil((DRAWINGS * 4) / 3)} THEN 'Full supply' ELSE 'Flood of 1978' END, 'SI', $1,
      timestamptz '2021-01-01' + n * interval '37 minutes' FROM ${series(Math.ceil((DRAWINGS * 16) / 9))};
  INSERT INTO note (id, net_id, number, anchor, state, created_by)
    SELECT ${id(7, 'n')}, ${net(`n % ${Math.ceil((DRAWINGS * 16) / 9)}`)}, 1 + n / ${Math.ceil((DRAWINGS * 16) / 9)},
      '{"on": "drawing"}', (ARRAY['open', 'answered', 'closed'])[1 + n % 3], $2 FROM ${series(DRAWINGS * 3)};
  INSERT INTO note_entry (id, note_id, author_id, text)
    SELECT ${id(8, 'n')}, ${id(7, `n % ${DRAWINGS * 3}`)}, $2, ${pick(NOTES, 'n')} || ' Reference ' || n % 977 || '.'
      FROM ${series(DRAWINGS * 4)};
  INSERT INTO revision (id, net_id, number, label, change_number, payload, payload_hash, engine_version, drawn_by, sent_by, reviewer_id,
      reviewer_ids, sent_at)
    SELECT ${id(9, 'n')}, ${net('n * 3')}, 1, 'A', 0, '{}', 'x', '1', ARRAY[$1], $1, $2, ARRAY[$2], now()
      FROM ${series(Math.floor((DRAWINGS * 16) / 27))};
  INSERT INTO decision (id, revision_id, decision, decided_by, decided_at)
    SELECT ${id(0, 'n')}, ${id(9, 'n * 2')}, (ARRAY['accepted', 'returned', 'accepted'])[1 + n % 3], $2, now()
      FROM ${series(Math.floor((DRAWINGS * 16) / 54))}`;

/** Fills the stand’s database with drawings, of whose dams the client may see four of five. */
export async function seedRegister({ ownerUrl }: BenchStand, client: ApiClient): Promise<void> {
  const db = new pg.Client({ connectionString: ownerUrl });
  await db.connect();
  try {
    const colleague = '000000aa-0000-7000-8000-000000000001';
    await db.query(
      `INSERT INTO person (id, email, name, admin) VALUES ($1, 'colleague@bench.example', 'Colleague', false)`,
      [colleague],
    );
    // The triggers would work row by row what the register itself works out at once.
    const tables = ['drawing', 'render_job', 'sheet', 'section', 'net', 'revision', 'decision', 'note_entry'];
    for (const table of tables) await db.query(`ALTER TABLE ${table} DISABLE TRIGGER ${table}_register`);
    for (const statement of SEED.split(';'))
      await db.query(
        statement.replaceAll('$1', `'${client.personId}'::uuid`).replaceAll('$2', `'${colleague}'::uuid`),
      );
    for (const table of tables) await db.query(`ALTER TABLE ${table} ENABLE TRIGGER ${table}_register`);
    await db.query('SELECT register_refresh(ARRAY(SELECT id FROM drawing))');
    await db.query('VACUUM ANALYZE');
  } finally {
    await db.end();
  }
}

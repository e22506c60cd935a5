import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Which changes of a table can change what the register says, and where its row tells the drawing. */
const MARKED: ReadonlyArray<{ table: string; on: string; drawing: string }> = [
  {
    table: 'drawing',
    on: 'INSERT OR DELETE OR UPDATE OF dam_id, number, title, revision, drawn_on, source, file_name, archived_at',
    drawing: 'changed.id',
  },
  { table: 'render_job', on: 'INSERT OR DELETE OR UPDATE OF state', drawing: 'changed.drawing_id' },
  { table: 'sheet', on: 'INSERT OR DELETE', drawing: 'changed.drawing_id' },
  {
    table: 'section',
    on: 'INSERT OR DELETE OR UPDATE OF name, chainage, archived_at',
    drawing: '(SELECT s.drawing_id FROM sheet s WHERE s.id = changed.sheet_id)',
  },
  {
    table: 'net',
    on: 'INSERT OR DELETE OR UPDATE OF name, archived_at',
    drawing: `(SELECT s.drawing_id FROM section c JOIN sheet s ON s.id = c.sheet_id WHERE c.id = changed.section_id)`,
  },
  { table: 'revision', on: 'INSERT', drawing: 'drawing_of_net(changed.net_id)' },
  {
    table: 'decision',
    on: 'INSERT',
    drawing: 'drawing_of_net((SELECT r.net_id FROM revision r WHERE r.id = changed.revision_id))',
  },
  {
    table: 'note_entry',
    on: 'INSERT OR DELETE OR UPDATE OF text',
    drawing: 'drawing_of_net((SELECT o.net_id FROM note o WHERE o.id = changed.note_id))',
  },
];

const TABLES = `
  CREATE TABLE register_entry (
    id uuid NOT NULL,
    kind text NOT NULL,
    dam_id uuid NOT NULL,
    drawing_id uuid NOT NULL,
    section_id uuid,
    sheet_id uuid,
    made_by uuid NOT NULL,
    people uuid array NOT NULL,
    states text array NOT NULL,
    archived boolean NOT NULL,
    at TIMESTAMP WITH TIME ZONE NOT NULL,
    dam_key text COLLATE "C" NOT NULL,
    sort_key text COLLATE "C" NOT NULL,
    words tsvector NOT NULL,
    CONSTRAINT ck_register_entry_kind CHECK (kind IN ('drawing', 'section', 'net')),
    CONSTRAINT pk_register_entry PRIMARY KEY (id)
  );
  CREATE INDEX ix_register_entry_words ON register_entry USING gin (words);
  CREATE INDEX ix_register_entry_states ON register_entry USING gin (states);
  CREATE INDEX ix_register_entry_people ON register_entry USING gin (people);
  CREATE INDEX ix_register_entry_drawing_id ON register_entry (drawing_id);
  CREATE INDEX ix_register_entry_sort_key ON register_entry (sort_key, id) WHERE NOT archived;
  CREATE INDEX ix_register_entry_dam_key ON register_entry (dam_key, sort_key, id) WHERE NOT archived;
  CREATE INDEX ix_register_entry_at ON register_entry (at, id) WHERE NOT archived;
  CREATE INDEX ix_register_entry_dam_id_sort_key ON register_entry (dam_id, sort_key, id);
  CREATE INDEX ix_register_entry_dam_id_at ON register_entry (dam_id, at, id);
  CREATE UNLOGGED TABLE register_stale (
    transaction bigint NOT NULL,
    drawing_id uuid NOT NULL,
    CONSTRAINT pk_register_stale PRIMARY KEY (transaction, drawing_id)
  )`;

/**
 * Words are what stands between signs, so that HF-118/03 is found by 118 as well as by HF-118/03, and by HF11803,
 * which `number_in_one` adds. Only words are kept, no places: a net with many long notes has to fit a tsvector. A sort
 * key is cut, since an index takes some 2,700 bytes of all its columns and names have up to 200 characters.
 */
const WORDS = `
  CREATE FUNCTION words_apart(said text) RETURNS text LANGUAGE sql IMMUTABLE AS $$
    SELECT regexp_replace(said, '[!-/:-@\\[-\`{-~‐-―−…·×]+', ' ', 'g')
  $$;
  CREATE FUNCTION search_words(said text) RETURNS tsvector LANGUAGE sql IMMUTABLE AS $$
    SELECT strip(to_tsvector('simple', words_apart(said)))
  $$;
  CREATE FUNCTION search_query(said text) RETURNS tsquery LANGUAGE sql IMMUTABLE AS $$
    SELECT to_tsquery('simple', coalesce(string_agg(word, ' & ') || ':*', ''))
    FROM regexp_split_to_table(words_apart(said), '\\s+') word WHERE word <> ''
  $$;
  CREATE FUNCTION number_in_one(number text) RETURNS text LANGUAGE sql IMMUTABLE AS $$
    SELECT regexp_replace(words_apart(number), '\\s+', '', 'g')
  $$;
  CREATE FUNCTION natural_key(said text) RETURNS text LANGUAGE sql IMMUTABLE AS $$
    SELECT left(regexp_replace(regexp_replace(lower(said), '(\\d+)', '00000000000\\1', 'g'), '\\d*(\\d{12})', '\\1', 'g'),
      100)
  $$`;

const FACTS = `
  CREATE FUNCTION drawing_of_net(net uuid) RETURNS uuid LANGUAGE sql STABLE AS $$
    SELECT s.drawing_id FROM net n JOIN section c ON c.id = n.section_id JOIN sheet s ON s.id = c.sheet_id
    WHERE n.id = net
  $$;
  CREATE FUNCTION net_state(net uuid) RETURNS text LANGUAGE sql STABLE AS $$
    SELECT CASE revision_state(r.id)
      WHEN 'waiting' THEN 'sent'
      WHEN 'accepted' THEN 'accepted'
      WHEN 'acceptedWithNotes' THEN 'accepted'
      WHEN 'returned' THEN 'returned'
      WHEN 'acceptanceWithdrawn' THEN 'returned'
      ELSE 'draft'
    END
    FROM (SELECT 1) one LEFT JOIN LATERAL
      (SELECT v.id FROM revision v WHERE v.net_id = net ORDER BY v.number DESC LIMIT 1) r ON true
  $$;
  CREATE FUNCTION people_of_net(net uuid) RETURNS uuid[] LANGUAGE sql STABLE AS $$
    SELECT array_agg(DISTINCT person) FROM (
      SELECT n.created_by AS person FROM net n WHERE n.id = net
      UNION SELECT b.person_id FROM command_batch b WHERE b.net_id = net
      UNION SELECT unnest(r.drawn_by) FROM revision r WHERE r.net_id = net
    ) p
  $$;
  CREATE FUNCTION note_words(net uuid) RETURNS text LANGUAGE sql STABLE AS $$
    SELECT coalesce(left(string_agg(e.text, ' ' ORDER BY e.created_at DESC), 300000), '')
    FROM note_entry e JOIN note o ON o.id = e.note_id WHERE o.net_id = net
  $$`;

/** What the register says of some drawings, with their sections and nets, worked out of the tables as they are. */
const ROWS = `
  CREATE FUNCTION register_rows(drawings uuid[]) RETURNS SETOF register_entry LANGUAGE sql STABLE AS $$
    WITH w AS MATERIALIZED (
      SELECT w.*, j.state AS job, natural_key(d.name) || chr(1) || d.id AS dam_key,
        concat_ws(chr(1), natural_key(coalesce(nullif(w.number, ''), nullif(w.title, ''), w.file_name)),
          natural_key(w.revision), w.id) AS key,
        concat_ws(' ', d.name, w.number, number_in_one(w.number), w.revision, w.title, w.drawn_on, w.source, w.file_name)
          AS said
      FROM drawing w JOIN dam d ON d.id = w.dam_id LEFT JOIN render_job j ON j.drawing_id = w.id
      WHERE w.id = ANY (drawings)
    ), c AS MATERIALIZED (
      SELECT c.*, s.drawing_id, w.dam_id, w.dam_key, w.archived_at IS NOT NULL AS under_archived,
        concat_ws(chr(1), w.key, natural_key(c.name), c.id) AS key,
        concat_ws(' ', w.said, c.name, c.chainage) AS said
      FROM w JOIN sheet s ON s.drawing_id = w.id JOIN section c ON c.sheet_id = s.id
    ), n AS MATERIALIZED (
      SELECT n.*, c.drawing_id, c.sheet_id, c.dam_id, c.dam_key, net_state(n.id) AS state,
        c.archived_at IS NOT NULL AS section_archived, c.under_archived OR c.archived_at IS NOT NULL AS under_archived,
        concat_ws(chr(1), c.key, natural_key(n.name), n.id) AS key, c.said
      FROM c JOIN net n ON n.section_id = c.id
    )
    SELECT w.id, 'drawing', w.dam_id, w.id, NULL::uuid,
      (SELECT s.id FROM sheet s WHERE s.drawing_id = w.id ORDER BY s.page_number LIMIT 1),
      w.uploaded_by, ARRAY[w.uploaded_by],
      CASE
        WHEN w.job IN ('waiting', 'running') THEN ARRAY['preparing']
        WHEN w.job IN ('refused', 'failed') THEN ARRAY['unusable']
        ELSE coalesce(has.states, ARRAY['bare'])
      END,
      w.archived_at IS NOT NULL, w.uploaded_at, w.dam_key, w.key, search_words(w.said)
    FROM w LEFT JOIN (
      SELECT n.drawing_id, array_agg(DISTINCT n.state) AS states FROM n
      WHERE n.archived_at IS NULL AND NOT n.section_archived GROUP BY n.drawing_id
    ) has ON has.drawing_id = w.id
    UNION ALL SELECT c.id, 'section', c.dam_id, c.drawing_id, c.id, c.sheet_id, c.created_by, ARRAY[c.created_by],
      coalesce(has.states, ARRAY['bare']),
      c.under_archived OR c.archived_at IS NOT NULL, c.created_at, c.dam_key, c.key, search_words(c.said)
    FROM c LEFT JOIN (
      SELECT n.section_id, array_agg(DISTINCT n.state) AS states FROM n WHERE n.archived_at IS NULL GROUP BY n.section_id
    ) has ON has.section_id = c.id
    UNION ALL SELECT n.id, 'net', n.dam_id, n.drawing_id, n.section_id, n.sheet_id, n.created_by, people_of_net(n.id),
      ARRAY[n.state], n.under_archived OR n.archived_at IS NOT NULL, n.updated_at, n.dam_key, n.key,
      search_words(concat_ws(' ', n.said, n.name, note_words(n.id)))
    FROM n
  $$`;

/**
 * A transaction notes which drawings it touched and brings the register up to date just before it commits, once for
 * each drawing: by then it holds all locks of its own, and those of the register come last, the drawing's row before
 * those below it, so that no two transactions wait for each other.
 */
const REFRESH = `
  CREATE FUNCTION register_refresh(drawings uuid[]) RETURNS void LANGUAGE plpgsql AS $$
  BEGIN
    PERFORM 1 FROM register_entry WHERE id = ANY (drawings) ORDER BY id FOR UPDATE;
    DELETE FROM register_entry e WHERE e.drawing_id = ANY (drawings)
      AND NOT EXISTS (SELECT 1 FROM drawing w WHERE w.id = e.id)
      AND NOT EXISTS (SELECT 1 FROM section c WHERE c.id = e.id)
      AND NOT EXISTS (SELECT 1 FROM net n WHERE n.id = e.id);
    INSERT INTO register_entry AS held SELECT * FROM register_rows(drawings)
    ON CONFLICT (id) DO UPDATE SET dam_id = excluded.dam_id, sheet_id = excluded.sheet_id,
      people = excluded.people, states = excluded.states, archived = excluded.archived, at = excluded.at,
      dam_key = excluded.dam_key, sort_key = excluded.sort_key, words = excluded.words
    WHERE held IS DISTINCT FROM excluded;
  END $$;
  CREATE FUNCTION register_refresh_stale() RETURNS trigger LANGUAGE plpgsql AS $$
  BEGIN
    PERFORM register_refresh(ARRAY[NEW.drawing_id]);
    DELETE FROM register_stale WHERE transaction = NEW.transaction AND drawing_id = NEW.drawing_id;
    RETURN NULL;
  END $$;
  CREATE CONSTRAINT TRIGGER register_refresh_stale AFTER INSERT ON register_stale
    DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION register_refresh_stale();
  CREATE FUNCTION register_mark(drawing uuid) RETURNS void LANGUAGE sql AS $$
    INSERT INTO register_stale (transaction, drawing_id)
    SELECT pg_current_xact_id()::text::bigint, drawing WHERE drawing IS NOT NULL
    ON CONFLICT DO NOTHING
  $$;
  CREATE FUNCTION register_mark_dam() RETURNS trigger LANGUAGE plpgsql AS $$
  BEGIN
    PERFORM register_mark(w.id) FROM drawing w WHERE w.dam_id = NEW.id;
    RETURN NULL;
  END $$;
  CREATE TRIGGER dam_register AFTER UPDATE OF name ON dam
    FOR EACH ROW EXECUTE FUNCTION register_mark_dam()`;

/** Tracing comes every second and changes neither words nor states: it only moves the net's time and its people. */
const TRACING = `
  CREATE FUNCTION register_net_traced() RETURNS trigger LANGUAGE plpgsql AS $$
  BEGIN
    PERFORM 1 FROM register_entry WHERE id = (SELECT e.drawing_id FROM register_entry e WHERE e.id = NEW.id) FOR UPDATE;
    UPDATE register_entry SET at = NEW.updated_at WHERE id = NEW.id AND at < NEW.updated_at;
    RETURN NULL;
  END $$;
  CREATE CONSTRAINT TRIGGER net_register_traced AFTER UPDATE OF updated_at ON net
    DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION register_net_traced();
  CREATE FUNCTION register_net_drawn() RETURNS trigger LANGUAGE plpgsql AS $$
  BEGIN
    IF EXISTS (SELECT 1 FROM register_entry WHERE id = NEW.net_id AND people @> ARRAY[NEW.person_id]) THEN
      RETURN NULL;
    END IF;
    PERFORM register_mark(drawing_of_net(NEW.net_id));
    RETURN NULL;
  END $$;
  CREATE TRIGGER command_batch_register AFTER INSERT ON command_batch
    FOR EACH ROW EXECUTE FUNCTION register_net_drawn()`;

const markOf = ({ table, on, drawing }: (typeof MARKED)[number]) => `
  CREATE FUNCTION register_mark_${table}() RETURNS trigger LANGUAGE plpgsql AS $$
  DECLARE changed ${table} := coalesce(NEW, OLD);
  BEGIN
    PERFORM register_mark(${drawing});
    RETURN NULL;
  END $$;
  CREATE TRIGGER ${table}_register AFTER ${on} ON ${table}
    FOR EACH ROW EXECUTE FUNCTION register_mark_${table}()`;

/**
 * The register of all drawings, sections and nets: a row for each with what lists filter, sort and search by, so that
 * twenty thousand drawings are listed by one index. Its rows are worked out of the other tables by triggers, in the
 * transaction of the change, and hold nothing that is not kept elsewhere.
 */
export class Register1796126400157 implements MigrationInterface {
  name = 'Register1796126400157';

  async up(queryRunner: QueryRunner): Promise<void> {
    for (const sql of [TABLES, WORDS, FACTS, ROWS, REFRESH, TRACING, ...MARKED.map(markOf)])
      await queryRunner.query(sql);
    await queryRunner.query('SELECT register_refresh(ARRAY(SELECT id FROM drawing))');
    await queryRunner.query(
      'GRANT SELECT, INSERT, UPDATE, DELETE ON register_entry, register_stale TO tracehead_app',
    );
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    for (const { table } of MARKED) {
      await queryRunner.query(`DROP TRIGGER ${table}_register ON ${table}`);
      await queryRunner.query(`DROP FUNCTION register_mark_${table}()`);
    }
    await queryRunner.query('DROP TRIGGER command_batch_register ON command_batch');
    await queryRunner.query('DROP TRIGGER net_register_traced ON net');
    await queryRunner.query('DROP TRIGGER dam_register ON dam');
    await queryRunner.query('DROP FUNCTION register_rows(uuid[])');
    await queryRunner.query('DROP TABLE register_stale, register_entry');
    for (const made of [
      'register_net_drawn()',
      'register_net_traced()',
      'register_mark_dam()',
      'register_mark(uuid)',
      'register_refresh_stale()',
      'register_refresh(uuid[])',
      'note_words(uuid)',
      'people_of_net(uuid)',
      'net_state(uuid)',
      'drawing_of_net(uuid)',
      'natural_key(text)',
      'number_in_one(text)',
      'search_query(text)',
      'search_words(text)',
      'words_apart(text)',
    ])
      await queryRunner.query(`DROP FUNCTION ${made}`);
  }
}

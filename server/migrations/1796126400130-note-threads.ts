import type { MigrationInterface, QueryRunner } from 'typeorm';

const REFERENCES: Array<[table: string, column: string, to: string]> = [
  ['note', 'must_answer_by', 'person'],
  ['note_entry_earlier', 'entry_id', 'note_entry'],
  ['note_file', 'net_id', 'net'],
  ['note_file', 'entry_id', 'note_entry'],
  ['note_file', 'uploaded_by', 'person'],
  ['note_read', 'note_id', 'note'],
  ['note_read', 'person_id', 'person'],
];

/** Notes that must be answered, names in them, earlier texts, files, and what each person has read. */
export class NoteThreads1796126400130 implements MigrationInterface {
  name = 'NoteThreads1796126400130';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`ALTER TABLE note
        ADD COLUMN must_answer_by uuid,
        ADD COLUMN must_answer_at TIMESTAMP WITH TIME ZONE`);
    await queryRunner.query(`ALTER TABLE note_entry
        ADD COLUMN edited_at TIMESTAMP WITH TIME ZONE,
        ADD COLUMN named uuid array NOT NULL DEFAULT '{}'`);
    await queryRunner.query(`CREATE TABLE note_entry_earlier (
        id uuid NOT NULL,
        entry_id uuid NOT NULL,
        text text NOT NULL,
        replaced_at TIMESTAMP WITH TIME ZONE NOT NULL,
        CONSTRAINT pk_note_entry_earlier PRIMARY KEY (id)
      )`);
    await queryRunner.query('CREATE INDEX ix_note_entry_earlier_entry_id ON note_entry_earlier (entry_id)');
    await queryRunner.query(`CREATE TABLE note_file (
        id uuid NOT NULL,
        net_id uuid NOT NULL,
        entry_id uuid,
        file_name text NOT NULL,
        media_type text NOT NULL,
        byte_size bigint NOT NULL,
        sha256 text NOT NULL,
        uploaded_by uuid NOT NULL,
        uploaded_at TIMESTAMP WITH TIME ZONE NOT NULL,
        CONSTRAINT pk_note_file PRIMARY KEY (id)
      )`);
    await queryRunner.query('CREATE INDEX ix_note_file_entry_id ON note_file (entry_id)');
    await queryRunner.query(`CREATE TABLE note_read (
        note_id uuid NOT NULL,
        person_id uuid NOT NULL,
        entries integer NOT NULL,
        CONSTRAINT pk_note_read PRIMARY KEY (note_id, person_id)
      )`);
    for (const [table, column, to] of REFERENCES)
      await queryRunner.query(
        `ALTER TABLE ${table} ADD CONSTRAINT fk_${table}_${column} FOREIGN KEY (${column}) REFERENCES ${to}(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
      );
    // What was said before stays as it was said.
    await queryRunner.query('GRANT SELECT, INSERT ON note_entry_earlier TO tracehead_app');
    await queryRunner.query('GRANT SELECT, INSERT, UPDATE ON note_file, note_read TO tracehead_app');
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    for (const table of ['note_read', 'note_file', 'note_entry_earlier'])
      await queryRunner.query(`DROP TABLE ${table}`);
    await queryRunner.query('ALTER TABLE note_entry DROP COLUMN named, DROP COLUMN edited_at');
    await queryRunner.query('ALTER TABLE note DROP COLUMN must_answer_at, DROP COLUMN must_answer_by');
  }
}

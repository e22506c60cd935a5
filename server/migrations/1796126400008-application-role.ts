import type { MigrationInterface, QueryRunner } from 'typeorm';

const CHANGEABLE = [
  'person',
  'person_token',
  'session',
  'dam',
  'membership',
  'drawing',
  'sheet',
  'render_job',
  'section',
  'net',
  'document_entity',
  'command_batch',
  'note',
  'note_entry',
  'outbox_mail',
];
/** Insert-only tables: what is written here stays as it was written. */
const APPEND_ONLY = ['event', 'revision', 'decision', 'artifact'];

/**
 * The role the application works as. It may not update, delete or truncate the ledger and the events; a trigger
 * refuses TRUNCATE to the tables' owner as well, since a row trigger would not see it.
 */
export class ApplicationRole1796126400008 implements MigrationInterface {
  name = 'ApplicationRole1796126400008';

  async up(queryRunner: QueryRunner): Promise<void> {
    // A role belongs to the whole cluster: another database of it may have made it already.
    await queryRunner.query(`DO $$ BEGIN
        IF NOT EXISTS (SELECT 1 FROM pg_roles WHERE rolname = 'tracehead_app') THEN
          CREATE ROLE tracehead_app NOLOGIN;
          -- A login that is no superuser has to be a member of the role to take it on connecting.
          EXECUTE format('GRANT tracehead_app TO %I', current_user);
        END IF;
      END $$`);
    await queryRunner.query('GRANT USAGE ON SCHEMA public TO tracehead_app');
    await queryRunner.query(
      `GRANT SELECT, INSERT, UPDATE, DELETE ON ${CHANGEABLE.join(', ')} TO tracehead_app`,
    );
    await queryRunner.query(`GRANT SELECT, INSERT ON ${APPEND_ONLY.join(', ')} TO tracehead_app`);
    await queryRunner.query('GRANT SELECT ON migration TO tracehead_app');
    await queryRunner.query(`CREATE FUNCTION refuse_truncate() RETURNS trigger LANGUAGE plpgsql AS $$
      BEGIN
        RAISE EXCEPTION 'The table % is append-only and cannot be emptied.', TG_TABLE_NAME;
      END $$`);
    for (const table of APPEND_ONLY)
      await queryRunner.query(
        `CREATE TRIGGER ${table}_refuse_truncate BEFORE TRUNCATE ON ${table} EXECUTE FUNCTION refuse_truncate()`,
      );
    // The job queue makes and alters tables of its own, in a schema of its own.
    await queryRunner.query('CREATE SCHEMA pgboss');
    await queryRunner.query('GRANT USAGE, CREATE ON SCHEMA pgboss TO tracehead_app');
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP SCHEMA pgboss CASCADE');
    for (const table of APPEND_ONLY)
      await queryRunner.query(`DROP TRIGGER ${table}_refuse_truncate ON ${table}`);
    await queryRunner.query('DROP FUNCTION refuse_truncate()');
    await queryRunner.query('REVOKE SELECT ON migration FROM tracehead_app');
    await queryRunner.query(`REVOKE ALL ON ${[...CHANGEABLE, ...APPEND_ONLY].join(', ')} FROM tracehead_app`);
    await queryRunner.query('REVOKE USAGE ON SCHEMA public FROM tracehead_app');
  }
}

import type { MigrationInterface, QueryRunner } from 'typeorm';

const REFERENCES: Array<[column: string, to: string]> = [
  ['dam_id', 'dam'],
  ['revision_id', 'revision'],
  ['digest_id', 'mail_digest'],
];
const STATES = `ALTER TABLE outbox_mail ADD CONSTRAINT ck_outbox_mail_state CHECK (state IN`;

/** Each person's choice of how notices are mailed, the digests, and what a mail is about. */
export class MailDigests1796126400154 implements MigrationInterface {
  name = 'MailDigests1796126400154';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`ALTER TABLE person
        ADD COLUMN mail_timing text NOT NULL DEFAULT 'atOnce',
        ADD COLUMN time_zone text NOT NULL DEFAULT 'UTC',
        ADD CONSTRAINT ck_person_mail_timing CHECK (mail_timing IN ('atOnce', 'daily', 'off'))`);
    await queryRunner.query(`CREATE TABLE mail_digest (
        id uuid NOT NULL,
        person_id uuid NOT NULL,
        due_at TIMESTAMP WITH TIME ZONE NOT NULL,
        done_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT pk_mail_digest PRIMARY KEY (id),
        CONSTRAINT fk_mail_digest_person_id FOREIGN KEY (person_id) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION
      )`);
    await queryRunner.query(
      'CREATE UNIQUE INDEX uq_mail_digest_person_id_open ON mail_digest (person_id) WHERE done_at IS NULL',
    );
    await queryRunner.query(`ALTER TABLE outbox_mail
        ADD COLUMN kind text NOT NULL DEFAULT '',
        ADD COLUMN dam_id uuid,
        ADD COLUMN revision_id uuid,
        ADD COLUMN brief text NOT NULL DEFAULT '',
        ADD COLUMN link text NOT NULL DEFAULT '',
        ADD COLUMN digest_id uuid`);
    for (const [column, to] of REFERENCES)
      await queryRunner.query(
        `ALTER TABLE outbox_mail ADD CONSTRAINT fk_outbox_mail_${column} FOREIGN KEY (${column}) REFERENCES ${to}(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
      );
    await queryRunner.query('CREATE INDEX ix_outbox_mail_digest_id ON outbox_mail (digest_id)');
    await queryRunner.query('ALTER TABLE outbox_mail DROP CONSTRAINT ck_outbox_mail_state');
    await queryRunner.query(`${STATES} ('waiting', 'sent', 'failed', 'held', 'inDigest', 'dropped'))`);
    await queryRunner.query('GRANT SELECT, INSERT, UPDATE ON mail_digest TO tracehead_app');
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE outbox_mail DROP CONSTRAINT ck_outbox_mail_state');
    // What still waited for a digest goes out by itself; what went within one, or was not wanted, counts as done.
    await queryRunner.query(
      `UPDATE outbox_mail SET state = CASE state WHEN 'held' THEN 'waiting' ELSE 'sent' END
        WHERE state IN ('held', 'inDigest', 'dropped')`,
    );
    await queryRunner.query(`${STATES} ('waiting', 'sent', 'failed'))`);
    await queryRunner.query(`ALTER TABLE outbox_mail
        DROP COLUMN digest_id, DROP COLUMN link, DROP COLUMN brief,
        DROP COLUMN revision_id, DROP COLUMN dam_id, DROP COLUMN kind`);
    await queryRunner.query('DROP TABLE mail_digest');
    await queryRunner.query('ALTER TABLE person DROP COLUMN time_zone, DROP COLUMN mail_timing');
  }
}

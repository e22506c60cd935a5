import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * Decisions are signed with name and capacity, and a wrong acceptance or a sending that is taken back is a record of
 * its own; a revision goes to one reviewer or several, by a day. `revision_state` is the one place that says what the
 * records of a revision come to. Reminders are rows of their own, outside of the ledger.
 */
export class SignedDecisions1796126400140 implements MigrationInterface {
  name = 'SignedDecisions1796126400140';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE decision DROP CONSTRAINT ck_decision_decision');
    await queryRunner.query(
      `ALTER TABLE decision ADD CONSTRAINT ck_decision_decision CHECK (decision IN ('accepted', 'acceptedWithNotes', 'returned', 'acceptanceWithdrawn', 'sendingWithdrawn'))`,
    );
    await queryRunner.query(`ALTER TABLE decision ADD signed_name text NOT NULL DEFAULT ''`);
    await queryRunner.query(`ALTER TABLE decision ADD capacity text NOT NULL DEFAULT ''`);
    await queryRunner.query('ALTER TABLE revision ADD reviewer_ids uuid array');
    await queryRunner.query('UPDATE revision SET reviewer_ids = ARRAY[reviewer_id]');
    await queryRunner.query('ALTER TABLE revision ALTER COLUMN reviewer_ids SET NOT NULL');
    await queryRunner.query('ALTER TABLE revision ADD due_on date');
    await queryRunner.query(`CREATE FUNCTION revision_state(asked uuid) RETURNS text LANGUAGE sql STABLE AS $$
      SELECT CASE
        WHEN bool_or(d.decision = 'sendingWithdrawn') THEN 'withdrawn'
        WHEN bool_or(d.decision = 'acceptanceWithdrawn') THEN 'acceptanceWithdrawn'
        WHEN bool_or(d.decision = 'returned') THEN 'returned'
        WHEN count(DISTINCT d.decided_by) < cardinality(r.reviewer_ids) THEN 'waiting'
        WHEN bool_or(d.decision = 'acceptedWithNotes') THEN 'acceptedWithNotes'
        ELSE 'accepted'
      END
      FROM revision r LEFT JOIN decision d ON d.revision_id = r.id
      WHERE r.id = asked GROUP BY r.id, r.reviewer_ids
    $$`);
    await queryRunner.query(`CREATE TABLE review_reminder (
        id uuid NOT NULL,
        revision_id uuid NOT NULL,
        kind text NOT NULL,
        at TIMESTAMP WITH TIME ZONE NOT NULL,
        done_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT ck_review_reminder_kind CHECK (kind IN ('dayBefore', 'overdue')),
        CONSTRAINT pk_review_reminder PRIMARY KEY (id)
      )`);
    await queryRunner.query(
      'CREATE UNIQUE INDEX uq_review_reminder_revision_id_kind ON review_reminder (revision_id, kind)',
    );
    await queryRunner.query(
      'ALTER TABLE review_reminder ADD CONSTRAINT fk_review_reminder_revision_id FOREIGN KEY (revision_id) REFERENCES revision(id) ON DELETE NO ACTION ON UPDATE NO ACTION',
    );
    await queryRunner.query('GRANT SELECT, INSERT, UPDATE ON review_reminder TO tracehead_app');
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE review_reminder');
    await queryRunner.query('DROP FUNCTION revision_state(uuid)');
    await queryRunner.query('ALTER TABLE revision DROP COLUMN due_on');
    await queryRunner.query('ALTER TABLE revision DROP COLUMN reviewer_ids');
    await queryRunner.query('ALTER TABLE decision DROP COLUMN capacity');
    await queryRunner.query('ALTER TABLE decision DROP COLUMN signed_name');
    await queryRunner.query('ALTER TABLE decision DROP CONSTRAINT ck_decision_decision');
    await queryRunner.query(
      `ALTER TABLE decision ADD CONSTRAINT ck_decision_decision CHECK (decision IN ('accepted', 'returned'))`,
    );
  }
}

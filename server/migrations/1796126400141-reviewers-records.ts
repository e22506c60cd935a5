import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * What reviewers do before they decide. `review_record` is part of the ledger: insert-only, chained by hash from the
 * revision's own hash on. `check_draft` holds ticks and answers until the decision freezes them, and a dam may have a
 * check list of its own. `figures_kept_back` is the one place that says from whom the figures of a revision are kept.
 */
export class ReviewersRecords1796126400141 implements MigrationInterface {
  name = 'ReviewersRecords1796126400141';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE dam ADD check_list jsonb');
    await queryRunner.query('ALTER TABLE revision ADD blind_first boolean');
    await queryRunner.query(`CREATE TABLE review_record (
        id uuid NOT NULL,
        revision_id uuid NOT NULL,
        number integer NOT NULL,
        kind text NOT NULL,
        person_id uuid NOT NULL,
        at TIMESTAMP WITH TIME ZONE NOT NULL,
        payload text NOT NULL,
        payload_hash text NOT NULL,
        previous_hash text NOT NULL,
        CONSTRAINT ck_review_record_kind CHECK (kind IN ('placesShown', 'figuresOpened', 'blindReading', 'decision')),
        CONSTRAINT pk_review_record PRIMARY KEY (id)
      )`);
    await queryRunner.query(
      'CREATE UNIQUE INDEX uq_review_record_revision_id_number ON review_record (revision_id, number)',
    );
    await queryRunner.query(
      'CREATE UNIQUE INDEX uq_review_record_revision_id_previous_hash ON review_record (revision_id, previous_hash)',
    );
    await queryRunner.query(
      'ALTER TABLE review_record ADD CONSTRAINT fk_review_record_revision_id FOREIGN KEY (revision_id) REFERENCES revision(id) ON DELETE NO ACTION ON UPDATE NO ACTION',
    );
    await queryRunner.query(
      'ALTER TABLE review_record ADD CONSTRAINT fk_review_record_person_id FOREIGN KEY (person_id) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION',
    );
    await queryRunner.query('GRANT SELECT, INSERT ON review_record TO tracehead_app');
    await queryRunner.query(
      'CREATE TRIGGER review_record_refuse_truncate BEFORE TRUNCATE ON review_record EXECUTE FUNCTION refuse_truncate()',
    );
    await queryRunner.query(`CREATE TABLE check_draft (
        revision_id uuid NOT NULL,
        person_id uuid NOT NULL,
        ticks text array NOT NULL DEFAULT '{}',
        answers jsonb NOT NULL DEFAULT '[]',
        changed_at TIMESTAMP WITH TIME ZONE NOT NULL,
        CONSTRAINT pk_check_draft PRIMARY KEY (revision_id, person_id)
      )`);
    await queryRunner.query(
      'ALTER TABLE check_draft ADD CONSTRAINT fk_check_draft_revision_id FOREIGN KEY (revision_id) REFERENCES revision(id) ON DELETE NO ACTION ON UPDATE NO ACTION',
    );
    await queryRunner.query(
      'ALTER TABLE check_draft ADD CONSTRAINT fk_check_draft_person_id FOREIGN KEY (person_id) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION',
    );
    await queryRunner.query('GRANT SELECT, INSERT, UPDATE ON check_draft TO tracehead_app');
    // Revisions that were sent before have no say in it (null): nobody knows who has opened their figures.
    await queryRunner.query(`CREATE FUNCTION figures_kept_back(asked uuid, reader uuid) RETURNS boolean LANGUAGE sql STABLE AS $$
      SELECT r.blind_first IS NOT NULL AND reader = ANY (r.reviewer_ids) AND revision_state(r.id) = 'waiting'
        AND NOT EXISTS (SELECT 1 FROM revision n WHERE n.net_id = r.net_id AND n.number > r.number)
        AND NOT EXISTS (SELECT 1 FROM review_record v
          WHERE v.revision_id = r.id AND v.person_id = reader AND v.kind IN ('figuresOpened', 'blindReading'))
      FROM revision r WHERE r.id = asked
    $$`);
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP FUNCTION figures_kept_back(uuid, uuid)');
    await queryRunner.query('DROP TABLE check_draft');
    await queryRunner.query('DROP TABLE review_record');
    await queryRunner.query('ALTER TABLE revision DROP COLUMN blind_first');
    await queryRunner.query('ALTER TABLE dam DROP COLUMN check_list');
  }
}

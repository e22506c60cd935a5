import type { MigrationInterface, QueryRunner } from 'typeorm';

export class Ledger1796126400006 implements MigrationInterface {
  name = 'Ledger1796126400006';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE TABLE revision (
        id uuid NOT NULL,
        net_id uuid NOT NULL,
        number integer NOT NULL,
        label text NOT NULL,
        payload text NOT NULL,
        payload_hash text NOT NULL,
        previous_hash text,
        engine_version text NOT NULL,
        drawn_by uuid array NOT NULL,
        sent_by uuid NOT NULL,
        reviewer_id uuid NOT NULL,
        message text NOT NULL DEFAULT '',
        sent_at TIMESTAMP WITH TIME ZONE NOT NULL,
        CONSTRAINT pk_revision PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_revision_reviewer_id ON revision (reviewer_id)`);
    await queryRunner.query(
      `CREATE UNIQUE INDEX uq_revision_net_id_previous_hash ON revision (net_id, previous_hash)`,
    );
    await queryRunner.query(`CREATE UNIQUE INDEX uq_revision_net_id_number ON revision (net_id, number)`);
    await queryRunner.query(`CREATE TABLE decision (
        id uuid NOT NULL,
        revision_id uuid NOT NULL,
        decision text NOT NULL,
        decided_by uuid NOT NULL,
        note text NOT NULL DEFAULT '',
        decided_at TIMESTAMP WITH TIME ZONE NOT NULL,
        CONSTRAINT ck_decision_decision CHECK (decision IN ('accepted', 'returned')),
        CONSTRAINT pk_decision PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_decision_revision_id ON decision (revision_id)`);
    await queryRunner.query(`CREATE TABLE artifact (
        id uuid NOT NULL,
        revision_id uuid NOT NULL,
        kind text NOT NULL,
        storage_key text NOT NULL,
        sha256 text NOT NULL,
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        CONSTRAINT pk_artifact PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_artifact_revision_id ON artifact (revision_id)`);
    await queryRunner.query(
      `ALTER TABLE revision ADD CONSTRAINT fk_revision_net_id FOREIGN KEY (net_id) REFERENCES net(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE revision ADD CONSTRAINT fk_revision_sent_by FOREIGN KEY (sent_by) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE revision ADD CONSTRAINT fk_revision_reviewer_id FOREIGN KEY (reviewer_id) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE decision ADD CONSTRAINT fk_decision_revision_id FOREIGN KEY (revision_id) REFERENCES revision(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE decision ADD CONSTRAINT fk_decision_decided_by FOREIGN KEY (decided_by) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE artifact ADD CONSTRAINT fk_artifact_revision_id FOREIGN KEY (revision_id) REFERENCES revision(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE artifact');
    await queryRunner.query('DROP TABLE decision');
    await queryRunner.query('DROP TABLE revision');
  }
}

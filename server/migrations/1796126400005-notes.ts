import type { MigrationInterface, QueryRunner } from 'typeorm';

export class Notes1796126400005 implements MigrationInterface {
  name = 'Notes1796126400005';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE TABLE note (
        id uuid NOT NULL,
        net_id uuid NOT NULL,
        number integer NOT NULL,
        anchor jsonb NOT NULL,
        state text NOT NULL DEFAULT 'open',
        created_by uuid NOT NULL,
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        closed_by uuid,
        closed_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT ck_note_state CHECK (state IN ('open', 'answered', 'closed')),
        CONSTRAINT pk_note PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE UNIQUE INDEX uq_note_net_id_number ON note (net_id, number)`);
    await queryRunner.query(`CREATE TABLE note_entry (
        id uuid NOT NULL,
        note_id uuid NOT NULL,
        author_id uuid NOT NULL,
        text text NOT NULL,
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        CONSTRAINT pk_note_entry PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_note_entry_note_id ON note_entry (note_id)`);
    await queryRunner.query(
      `ALTER TABLE note ADD CONSTRAINT fk_note_net_id FOREIGN KEY (net_id) REFERENCES net(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE note ADD CONSTRAINT fk_note_created_by FOREIGN KEY (created_by) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE note ADD CONSTRAINT fk_note_closed_by FOREIGN KEY (closed_by) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE note_entry ADD CONSTRAINT fk_note_entry_note_id FOREIGN KEY (note_id) REFERENCES note(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE note_entry ADD CONSTRAINT fk_note_entry_author_id FOREIGN KEY (author_id) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE note_entry');
    await queryRunner.query('DROP TABLE note');
  }
}

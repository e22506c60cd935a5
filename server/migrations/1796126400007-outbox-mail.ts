import type { MigrationInterface, QueryRunner } from 'typeorm';

export class OutboxMail1796126400007 implements MigrationInterface {
  name = 'OutboxMail1796126400007';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE TABLE outbox_mail (
        id uuid NOT NULL,
        message_id text NOT NULL,
        person_id uuid,
        to_address text NOT NULL,
        subject text NOT NULL,
        text text NOT NULL,
        html text NOT NULL,
        state text NOT NULL DEFAULT 'waiting',
        attempts integer NOT NULL DEFAULT '0',
        next_attempt_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        lease_until TIMESTAMP WITH TIME ZONE,
        last_error text NOT NULL DEFAULT '',
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        sent_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT ck_outbox_mail_state CHECK (state IN ('waiting', 'sent', 'failed')),
        CONSTRAINT pk_outbox_mail PRIMARY KEY (id)
      )`);
    await queryRunner.query(
      `CREATE INDEX ix_outbox_mail_state_next_attempt_at ON outbox_mail (state, next_attempt_at)`,
    );
    await queryRunner.query(
      `ALTER TABLE outbox_mail ADD CONSTRAINT fk_outbox_mail_person_id FOREIGN KEY (person_id) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE outbox_mail');
  }
}

import type { MigrationInterface, QueryRunner } from 'typeorm';

export class People1796126400001 implements MigrationInterface {
  name = 'People1796126400001';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE TABLE person (
        id uuid NOT NULL,
        email text NOT NULL,
        name text NOT NULL,
        password_hash text,
        admin boolean NOT NULL DEFAULT false,
        deactivated_at TIMESTAMP WITH TIME ZONE,
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        CONSTRAINT ck_person_email_lower CHECK (email = lower(email)),
        CONSTRAINT pk_person PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE UNIQUE INDEX uq_person_email ON person (email)`);
    await queryRunner.query(`CREATE TABLE person_token (
        id uuid NOT NULL,
        person_id uuid NOT NULL,
        purpose text NOT NULL,
        token_hash text NOT NULL,
        dam_id uuid,
        issued_by uuid,
        expires_at TIMESTAMP WITH TIME ZONE NOT NULL,
        used_at TIMESTAMP WITH TIME ZONE,
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        CONSTRAINT ck_person_token_purpose CHECK (purpose IN ('invitation', 'reset')),
        CONSTRAINT pk_person_token PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_person_token_person_id ON person_token (person_id)`);
    await queryRunner.query(`CREATE UNIQUE INDEX uq_person_token_hash ON person_token (token_hash)`);
    await queryRunner.query(`CREATE TABLE session (
        sid character varying NOT NULL,
        sess json NOT NULL,
        expire TIMESTAMP(6) NOT NULL,
        CONSTRAINT pk_session PRIMARY KEY (sid)
      )`);
    await queryRunner.query(`CREATE INDEX ix_session_expire ON session (expire)`);
    await queryRunner.query(
      `ALTER TABLE person_token ADD CONSTRAINT fk_person_token_person_id FOREIGN KEY (person_id) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE person_token ADD CONSTRAINT fk_person_token_issued_by FOREIGN KEY (issued_by) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE session');
    await queryRunner.query('DROP TABLE person_token');
    await queryRunner.query('DROP TABLE person');
  }
}

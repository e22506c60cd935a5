import type { MigrationInterface, QueryRunner } from 'typeorm';

export class DamsAndEvents1796126400002 implements MigrationInterface {
  name = 'DamsAndEvents1796126400002';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE TABLE dam (
        id uuid NOT NULL,
        name text NOT NULL,
        unit_system text NOT NULL,
        datum text NOT NULL,
        full_supply_level double precision,
        gamma_w double precision NOT NULL,
        created_by uuid NOT NULL,
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        archived_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT ck_dam_gamma_w CHECK (gamma_w > 0),
        CONSTRAINT ck_dam_unit_system CHECK (unit_system IN ('SI', 'US')),
        CONSTRAINT pk_dam PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE TABLE membership (
        dam_id uuid NOT NULL,
        person_id uuid NOT NULL,
        roles text array NOT NULL,
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        CONSTRAINT ck_membership_roles CHECK (roles <@ ARRAY['engineer', 'reviewer', 'colleague'] AND array_length(roles, 1) > 0),
        CONSTRAINT pk_membership PRIMARY KEY (dam_id, person_id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_membership_person_id ON membership (person_id)`);
    await queryRunner.query(`CREATE TABLE event (
        id uuid NOT NULL,
        dam_id uuid,
        drawing_id uuid,
        net_id uuid,
        person_id uuid,
        type text NOT NULL,
        text text NOT NULL,
        detail jsonb NOT NULL DEFAULT '{}',
        at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        CONSTRAINT pk_event PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_event_dam_id_at ON event (dam_id, at)`);
    await queryRunner.query(
      `ALTER TABLE dam ADD CONSTRAINT fk_dam_created_by FOREIGN KEY (created_by) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE membership ADD CONSTRAINT fk_membership_dam_id FOREIGN KEY (dam_id) REFERENCES dam(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE membership ADD CONSTRAINT fk_membership_person_id FOREIGN KEY (person_id) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE event ADD CONSTRAINT fk_event_dam_id FOREIGN KEY (dam_id) REFERENCES dam(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE event ADD CONSTRAINT fk_event_person_id FOREIGN KEY (person_id) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE event');
    await queryRunner.query('DROP TABLE membership');
    await queryRunner.query('DROP TABLE dam');
  }
}

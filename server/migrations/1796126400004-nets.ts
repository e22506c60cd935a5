import type { MigrationInterface, QueryRunner } from 'typeorm';

export class Nets1796126400004 implements MigrationInterface {
  name = 'Nets1796126400004';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE TABLE section (
        id uuid NOT NULL,
        sheet_id uuid NOT NULL,
        name text NOT NULL,
        chainage text NOT NULL DEFAULT '',
        frame double precision array,
        created_by uuid NOT NULL,
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        archived_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT pk_section PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_section_sheet_id ON section (sheet_id)`);
    await queryRunner.query(`CREATE TABLE net (
        id uuid NOT NULL,
        section_id uuid NOT NULL,
        name text NOT NULL,
        unit_system text NOT NULL,
        change_number bigint NOT NULL DEFAULT '0',
        created_by uuid NOT NULL,
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        updated_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        archived_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT ck_net_unit_system CHECK (unit_system IN ('SI', 'US')),
        CONSTRAINT pk_net PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_net_section_id ON net (section_id)`);
    await queryRunner.query(`CREATE TABLE document_entity (
        owner_id uuid NOT NULL,
        entity_id uuid NOT NULL,
        net_id uuid,
        section_id uuid,
        kind text NOT NULL,
        version integer NOT NULL,
        value jsonb NOT NULL,
        removed boolean NOT NULL DEFAULT false,
        change_number bigint NOT NULL DEFAULT '0',
        client_id uuid,
        changed_by uuid NOT NULL,
        changed_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        CONSTRAINT ck_document_entity_version CHECK (version > 0),
        CONSTRAINT ck_document_entity_owner CHECK ((net_id IS NULL) <> (section_id IS NULL)),
        CONSTRAINT pk_document_entity PRIMARY KEY (owner_id, entity_id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_document_entity_net_id ON document_entity (net_id)`);
    await queryRunner.query(`CREATE INDEX ix_document_entity_section_id ON document_entity (section_id)`);
    await queryRunner.query(`CREATE TABLE command_batch (
        net_id uuid NOT NULL,
        client_id uuid NOT NULL,
        seq integer NOT NULL,
        person_id uuid NOT NULL,
        change_number bigint NOT NULL,
        label text NOT NULL DEFAULT '',
        result jsonb NOT NULL,
        received_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        CONSTRAINT pk_command_batch PRIMARY KEY (net_id, client_id, seq)
      )`);
    await queryRunner.query(
      `CREATE INDEX ix_command_batch_net_id_person_id ON command_batch (net_id, person_id)`,
    );
    await queryRunner.query(
      `ALTER TABLE section ADD CONSTRAINT fk_section_sheet_id FOREIGN KEY (sheet_id) REFERENCES sheet(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE section ADD CONSTRAINT fk_section_created_by FOREIGN KEY (created_by) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE net ADD CONSTRAINT fk_net_section_id FOREIGN KEY (section_id) REFERENCES section(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE net ADD CONSTRAINT fk_net_created_by FOREIGN KEY (created_by) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE document_entity ADD CONSTRAINT fk_document_entity_net_id FOREIGN KEY (net_id) REFERENCES net(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE document_entity ADD CONSTRAINT fk_document_entity_section_id FOREIGN KEY (section_id) REFERENCES section(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE document_entity ADD CONSTRAINT fk_document_entity_changed_by FOREIGN KEY (changed_by) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE command_batch ADD CONSTRAINT fk_command_batch_net_id FOREIGN KEY (net_id) REFERENCES net(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE command_batch ADD CONSTRAINT fk_command_batch_person_id FOREIGN KEY (person_id) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE command_batch');
    await queryRunner.query('DROP TABLE document_entity');
    await queryRunner.query('DROP TABLE net');
    await queryRunner.query('DROP TABLE section');
  }
}

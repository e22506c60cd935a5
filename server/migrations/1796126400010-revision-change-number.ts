import type { MigrationInterface, QueryRunner } from 'typeorm';

/** A revision says up to which change of the net it was frozen, so that later changes can be told. */
export class RevisionChangeNumber1796126400010 implements MigrationInterface {
  name = 'RevisionChangeNumber1796126400010';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE revision ADD change_number bigint NOT NULL');
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE revision DROP COLUMN change_number');
  }
}

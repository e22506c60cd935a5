import type { MigrationInterface, QueryRunner } from 'typeorm';

/** A sheet can be seen before all its tiles are there, and a page of vectors drawn again at a chosen resolution. */
export class FirstView1796126400100 implements MigrationInterface {
  name = 'FirstView1796126400100';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(
      'ALTER TABLE sheet ADD COLUMN ready_zoom integer, ADD COLUMN is_drawn boolean NOT NULL DEFAULT false',
    );
    await queryRunner.query('ALTER TABLE render_job ADD COLUMN asked_dpi integer');
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE render_job DROP COLUMN asked_dpi');
    await queryRunner.query('ALTER TABLE sheet DROP COLUMN is_drawn, DROP COLUMN ready_zoom');
  }
}

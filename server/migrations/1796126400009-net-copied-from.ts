import type { MigrationInterface, QueryRunner } from 'typeorm';

/** A copy of a net remembers its source, so that who drew the source counts as having drawn the copy. */
export class NetCopiedFrom1796126400009 implements MigrationInterface {
  name = 'NetCopiedFrom1796126400009';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE net ADD copied_from uuid');
    await queryRunner.query(
      `ALTER TABLE net ADD CONSTRAINT fk_net_copied_from FOREIGN KEY (copied_from) REFERENCES net(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE net DROP CONSTRAINT fk_net_copied_from');
    await queryRunner.query('ALTER TABLE net DROP COLUMN copied_from');
  }
}

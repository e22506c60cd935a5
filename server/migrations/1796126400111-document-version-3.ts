import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Version 3 of the net's document adds two ways of setting out, by which no section that is there is set out yet. */
export class DocumentVersion31796126400111 implements MigrationInterface {
  name = 'DocumentVersion31796126400111';

  async up(): Promise<void> {}

  /** A section set out in a way that version 2 does not know has to be set out anew there: one scale is where it begins. */
  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(
      `UPDATE document_entity SET value = value || '{"scales": "equal"}'::jsonb
       WHERE kind = 'setOut' AND value->>'scales' IN ('stretchedPaper', 'perspective')`,
    );
  }
}

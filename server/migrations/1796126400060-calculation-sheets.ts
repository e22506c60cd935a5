import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Calculation sheets that were asked for. */
export class CalculationSheets1796126400060 implements MigrationInterface {
  name = 'CalculationSheets1796126400060';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE TABLE calculation_sheet (
        id uuid NOT NULL,
        net_id uuid NOT NULL,
        revision_id uuid,
        paper text NOT NULL,
        job_number text NOT NULL DEFAULT '',
        state text NOT NULL DEFAULT 'waiting',
        message text NOT NULL DEFAULT '',
        attempts integer NOT NULL DEFAULT 0,
        storage_key text,
        sha256 text,
        byte_size integer,
        asked_by uuid NOT NULL,
        asked_at TIMESTAMP WITH TIME ZONE NOT NULL,
        finished_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT ck_calculation_sheet_paper CHECK (paper IN ('A4', 'A3')),
        CONSTRAINT ck_calculation_sheet_state CHECK (state IN ('waiting', 'done', 'failed')),
        CONSTRAINT pk_calculation_sheet PRIMARY KEY (id)
      )`);
    await queryRunner.query(
      `CREATE INDEX ix_calculation_sheet_net_id_asked_at ON calculation_sheet (net_id, asked_at)`,
    );
    for (const [column, table] of [
      ['net_id', 'net'],
      ['revision_id', 'revision'],
      ['asked_by', 'person'],
    ])
      await queryRunner.query(
        `ALTER TABLE calculation_sheet ADD CONSTRAINT fk_calculation_sheet_${column} FOREIGN KEY (${column}) REFERENCES ${table}(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
      );
    await queryRunner.query('GRANT SELECT, INSERT, UPDATE ON calculation_sheet TO tracehead_app');
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE calculation_sheet');
  }
}

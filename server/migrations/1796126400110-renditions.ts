import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Cleaned-up pictures of sheets. */
export class Renditions1796126400110 implements MigrationInterface {
  name = 'Renditions1796126400110';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE TABLE rendition (
        id uuid NOT NULL,
        sheet_id uuid NOT NULL,
        settings jsonb NOT NULL,
        width_px integer NOT NULL,
        height_px integer NOT NULL,
        to_base double precision array NOT NULL,
        tile_size_px integer,
        max_zoom integer,
        tile_format text,
        shown boolean NOT NULL DEFAULT false,
        state text NOT NULL DEFAULT 'waiting',
        progress double precision NOT NULL DEFAULT 0,
        message text NOT NULL DEFAULT '',
        attempts integer NOT NULL DEFAULT 0,
        run_id uuid,
        lease_until TIMESTAMP WITH TIME ZONE,
        made_by uuid NOT NULL,
        made_at TIMESTAMP WITH TIME ZONE NOT NULL,
        finished_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT ck_rendition_state CHECK (state IN ('waiting', 'running', 'done', 'refused', 'failed')),
        CONSTRAINT pk_rendition PRIMARY KEY (id)
      )`);
    await queryRunner.query('CREATE INDEX ix_rendition_sheet_id_made_at ON rendition (sheet_id, made_at)');
    await queryRunner.query('CREATE UNIQUE INDEX uq_rendition_shown ON rendition (sheet_id) WHERE shown');
    for (const [column, table] of [
      ['sheet_id', 'sheet'],
      ['made_by', 'person'],
    ])
      await queryRunner.query(
        `ALTER TABLE rendition ADD CONSTRAINT fk_rendition_${column} FOREIGN KEY (${column}) REFERENCES ${table}(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
      );
    await queryRunner.query('GRANT SELECT, INSERT, UPDATE ON rendition TO tracehead_app');
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE rendition');
  }
}

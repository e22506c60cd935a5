import type { MigrationInterface, QueryRunner } from 'typeorm';

export class Drawings1796126400003 implements MigrationInterface {
  name = 'Drawings1796126400003';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE TABLE drawing (
        id uuid NOT NULL,
        dam_id uuid NOT NULL,
        sha256 text NOT NULL,
        file_name text NOT NULL,
        media_type text NOT NULL,
        byte_size bigint NOT NULL,
        number text NOT NULL DEFAULT '',
        title text NOT NULL DEFAULT '',
        revision text NOT NULL DEFAULT '',
        drawn_on text NOT NULL DEFAULT '',
        stage text,
        source text NOT NULL DEFAULT '',
        uploaded_by uuid NOT NULL,
        uploaded_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        archived_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT ck_drawing_stage CHECK (stage IS NULL OR stage IN ('asBuilt', 'design')),
        CONSTRAINT pk_drawing PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE INDEX ix_drawing_dam_id_sha256 ON drawing (dam_id, sha256)`);
    await queryRunner.query(`CREATE TABLE sheet (
        id uuid NOT NULL,
        drawing_id uuid NOT NULL,
        page_number integer NOT NULL,
        width_px integer NOT NULL,
        height_px integer NOT NULL,
        dpi double precision,
        rendition text NOT NULL,
        tile_size_px integer NOT NULL,
        max_zoom integer NOT NULL,
        tile_format text NOT NULL,
        note text NOT NULL DEFAULT '',
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        CONSTRAINT pk_sheet PRIMARY KEY (id)
      )`);
    await queryRunner.query(
      `CREATE UNIQUE INDEX uq_sheet_drawing_id_page_number ON sheet (drawing_id, page_number)`,
    );
    await queryRunner.query(`CREATE TABLE render_job (
        id uuid NOT NULL,
        drawing_id uuid NOT NULL,
        state text NOT NULL DEFAULT 'waiting',
        pages_total integer,
        pages_done integer NOT NULL DEFAULT '0',
        page_progress double precision NOT NULL DEFAULT '0',
        message text NOT NULL DEFAULT '',
        attempts integer NOT NULL DEFAULT '0',
        run_id uuid,
        lease_until TIMESTAMP WITH TIME ZONE,
        created_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        finished_at TIMESTAMP WITH TIME ZONE,
        CONSTRAINT ck_render_job_state CHECK (state IN ('waiting', 'running', 'done', 'refused', 'failed')),
        CONSTRAINT pk_render_job PRIMARY KEY (id)
      )`);
    await queryRunner.query(`CREATE UNIQUE INDEX uq_render_job_drawing_id ON render_job (drawing_id)`);
    await queryRunner.query(
      `ALTER TABLE drawing ADD CONSTRAINT fk_drawing_dam_id FOREIGN KEY (dam_id) REFERENCES dam(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE drawing ADD CONSTRAINT fk_drawing_uploaded_by FOREIGN KEY (uploaded_by) REFERENCES person(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE sheet ADD CONSTRAINT fk_sheet_drawing_id FOREIGN KEY (drawing_id) REFERENCES drawing(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await queryRunner.query(
      `ALTER TABLE render_job ADD CONSTRAINT fk_render_job_drawing_id FOREIGN KEY (drawing_id) REFERENCES drawing(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE render_job');
    await queryRunner.query('DROP TABLE sheet');
    await queryRunner.query('DROP TABLE drawing');
  }
}

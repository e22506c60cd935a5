import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Desks that are open on a net now. Unlogged: written every few seconds, and worth nothing after a crash. */
export class NetPresence1796126400120 implements MigrationInterface {
  name = 'NetPresence1796126400120';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE UNLOGGED TABLE net_presence (
        net_id uuid NOT NULL,
        client_id uuid NOT NULL,
        person_id uuid NOT NULL,
        tool text NOT NULL,
        entity_id uuid,
        seen_at TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
        CONSTRAINT pk_net_presence PRIMARY KEY (net_id, client_id)
      )`);
    for (const [column, table] of [
      ['net_id', 'net'],
      ['person_id', 'person'],
    ])
      await queryRunner.query(
        `ALTER TABLE net_presence ADD CONSTRAINT fk_net_presence_${column} FOREIGN KEY (${column}) REFERENCES ${table}(id) ON DELETE NO ACTION ON UPDATE NO ACTION`,
      );
    await queryRunner.query('GRANT SELECT, INSERT, UPDATE, DELETE ON net_presence TO tracehead_app');
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE net_presence');
  }
}

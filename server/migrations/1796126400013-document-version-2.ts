import type { MigrationInterface, QueryRunner } from 'typeorm';

const SOIL =
  '{"kv": null, "dipDeg": 0, "saturatedUnitWeight": null, "moistUnitWeight": null, "specificGravity": null, "voidRatio": null}';

/** Fields that version 2 of the net's document adds, by kind, with what they say while nobody has filled them in. */
const ADDED: Readonly<Record<string, string>> = {
  setOut: '{"scales": "equal"}',
  line: '{"origin": "traced"}',
  readingPoint: '{"elevationPlusMinus": null, "measured": null}',
  waterLevels:
    '{"headwaterPlusMinus": null, "tailwaterPlusMinus": null, "gammaWPlusMinus": null, "datumPlusMinus": null}',
  permeability: SOIL,
  netCount: '{"countedIn": null}',
};

/** Entities of nets drawn before get the fields of the document's second version. */
export class DocumentVersion21796126400013 implements MigrationInterface {
  name = 'DocumentVersion21796126400013';

  async up(queryRunner: QueryRunner): Promise<void> {
    for (const [kind, fields] of Object.entries(ADDED)) {
      await queryRunner.query('UPDATE document_entity SET value = $2::jsonb || value WHERE kind = $1', [
        kind,
        fields,
      ]);
    }
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query("DELETE FROM document_entity WHERE kind IN ('profile', 'soil')");
    for (const [kind, fields] of Object.entries(ADDED)) {
      await queryRunner.query(
        'UPDATE document_entity SET value = value - ARRAY(SELECT jsonb_object_keys($2::jsonb)) WHERE kind = $1',
        [kind, fields],
      );
    }
  }
}

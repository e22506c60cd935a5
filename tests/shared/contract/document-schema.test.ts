import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { fromJSONSchema } from 'zod';
import { documentEntity } from '#shared/contract/document.ts';
import { documentJsonSchema } from '#shared/contract/document-schema.ts';
import { upgradeDocument } from '#shared/contract/document-versions.ts';
import { firstDocument } from '#tests/support/first-version/first-version.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

const root = path.resolve(import.meta.dirname, '..', '..', '..');
const committed = readFileSync(path.join(root, 'shared/contract/flow-net-document.schema.json'), 'utf8');
const KINDS = documentEntity.def.options.flatMap((option) => option.shape.kind.def.values);

describe('the JSON Schema of the document', () => {
  it('refuses what is no net document', () => {
    const schema = fromJSONSchema(JSON.parse(committed));
    for (const change of [
      { format: 'other' },
      { unitSystem: 'metric' },
      { sheet: { widthPx: 0, heightPx: 10, dpi: null } },
      { entities: { x: {} } },
    ]) {
      expect(schema.safeParse({ ...finishedDocument(), ...change }).success, JSON.stringify(change)).toBe(
        false,
      );
    }
  });

  it('admits a net that the product saved, and one that leaves out what has a default', () => {
    const schema = fromJSONSchema(JSON.parse(committed));
    expect(schema.safeParse(finishedDocument()).error?.issues).toBeUndefined();
    expect(schema.safeParse(upgradeDocument(firstDocument())).error?.issues).toBeUndefined();
  });

  it('is committed as it is generated ("npm run schema" writes it)', () => {
    expect(JSON.parse(committed)).toEqual(documentJsonSchema());
  });

  it('describes every kind of entity, and the README lists each', () => {
    const { $defs } = documentJsonSchema() as { $defs: Record<string, { description?: string }> };
    const readme = readFileSync(path.join(root, 'README.md'), 'utf8');
    expect(KINDS).toHaveLength(9);
    for (const kind of KINDS) {
      expect($defs[kind]?.description, kind).toMatch(/\.$/);
      expect(readme, kind).toContain(`| \`${kind}\``);
    }
  });
});

import { writeFileSync } from 'node:fs';
import path from 'node:path';
import { documentJsonSchema } from '#shared/contract/document-schema.ts';

/** Writes the JSON Schema of the net's document into the sources: `npm run schema`. */
const file = path.resolve(import.meta.dirname, '../../shared/contract/flow-net-document.schema.json');
writeFileSync(file, `${JSON.stringify(documentJsonSchema(), null, 2)}\n`);
process.stdout.write(`${file}\n`);

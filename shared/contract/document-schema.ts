import * as z from 'zod/mini';
import {
  type EntityKind,
  FLOW_NET_VERSION,
  flowNetDocument,
  knownPoint,
  netCount,
  permeability,
  profile,
  readingPoint,
  setOut,
  soil,
  tracedLine,
  versionedEntity,
  waterLevels,
} from './document.ts';

/** What each kind of entity is, in the words of the trade; in the order in which a net is made. */
const KINDS: ReadonlyArray<readonly [kind: EntityKind, schema: z.core.$ZodType, description: string]> = [
  ['setOut', setOut, 'How the section is put to scale. One for each section, shared by its nets.'],
  ['knownPoint', knownPoint, 'A point on the sheet whose offset and elevation are known.'],
  [
    'waterLevels',
    waterLevels,
    'Headwater, tailwater and unit weight of water, each with its plus-minus. Exactly one.',
  ],
  [
    'permeability',
    permeability,
    'The soil of the section, or of all that no other soil claims. Exactly one.',
  ],
  ['soil', soil, 'A soil of its own, in the regions between soil boundaries in which its places lie.'],
  ['line', tracedLine, 'A traced line: equipotential, flow line, phreatic line or boundary.'],
  ['netCount', netCount, 'What was counted on the drawing, and how accurately it was traced. Exactly one.'],
  [
    'readingPoint',
    readingPoint,
    'A place where a head is wanted, and what an instrument showed there, if any did.',
  ],
  ['profile', profile, 'A line, a list of places or a grid along which heads are wanted.'],
];

/**
 * The JSON Schema (draft 2020-12) of a net's document in the present version, as a file may give it: fields with a
 * default may be left out. Places are in pixels of the sheet, origin at the top-left corner, y down; offsets,
 * elevations and lengths in metres (SI) or feet (US).
 */
export function documentJsonSchema(): Record<string, unknown> {
  const names = z.registry<{ id: string; description?: string }>();
  for (const [id, schema, description] of KINDS) names.add(schema, { id, description });
  names.add(versionedEntity, { id: 'entity', description: 'An entity under its id, with its version.' });
  const { $schema, ...rest } = z.toJSONSchema(flowNetDocument, { io: 'input', metadata: names });
  return { $schema, title: `Flow net document, version ${FLOW_NET_VERSION}`, ...rest };
}

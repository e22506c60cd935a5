import { type DocumentEntity, documentEntity, FLOW_NET_VERSION } from './document.ts';

/** What brings a document of a version, as parsed JSON, to the next one. */
const UPGRADES: Readonly<Record<number, (document: Record<string, unknown>) => Record<string, unknown>>> = {
  // Version 2 only adds fields and kinds, and the schema fills what an older document leaves out.
  1: (document) => document,
  // Version 3 only adds ways of setting out.
  2: (document) => document,
};

/**
 * Brings parsed JSON that claims an older version of the document to the present one, so that the schema can check it;
 * anything else comes back as it is, for the schema to refuse.
 */
export function upgradeDocument(json: unknown): unknown {
  if (typeof json !== 'object' || json === null || Array.isArray(json)) return json;
  let document = json as Record<string, unknown>;
  for (let version = document.version; typeof version === 'number' && version < FLOW_NET_VERSION; ) {
    const upgrade = UPGRADES[version];
    if (upgrade === undefined) return document;
    version += 1;
    document = { ...upgrade(document), version };
  }
  return document;
}

/**
 * An entity that an earlier version of the page kept in the browser, with the fields that were added since; one that the
 * schema refuses comes back as it is, for the server to say what is the matter with it.
 */
export function completeEntity(kept: unknown): DocumentEntity {
  const parsed = documentEntity.safeParse(kept);
  return parsed.success ? parsed.data : (kept as DocumentEntity);
}

import type { ComparedSide } from '#client/lib/paths.ts';

/** A side as the address names it, "net:…" or "revision:…"; null for anything else. */
export function parseSide(named: string | null): ComparedSide | null {
  const [, kind, id] = /^(net|revision):([0-9a-f-]{36})$/i.exec(named ?? '') ?? [];
  if (kind === undefined || id === undefined) return null;
  return { kind: kind.toLowerCase() as ComparedSide['kind'], id: id.toLowerCase() };
}

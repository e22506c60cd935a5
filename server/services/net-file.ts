import {
  findNodeAtLocation,
  getNodePath,
  type Node,
  type ParseError,
  parseTree,
  printParseErrorCode,
} from 'jsonc-parser';
import * as z from 'zod/mini';
import {
  type FlowNetDocument,
  flowNetDocument,
  SINGLE_KINDS,
  type VersionedEntity,
} from '#shared/contract/document.ts';
import { upgradeDocument } from '#shared/contract/document-versions.ts';

/** A fault of a net file: the line it is on, the field as a path, and what is the matter. */
export type NetFileFault = { readonly line: number; readonly field: string; readonly message: string };

export type NetFile = { readonly document: FlowNetDocument } | { readonly faults: NetFileFault[] };

/**
 * Reads the text of a net file into a document, or says all that is wrong with it, each fault with its line and field.
 * A byte order mark is passed over; comments and trailing commas are faults, as in any JSON.
 */
export function parseNetFile(source: string): NetFile {
  const text = source.replace(/^\uFEFF/, '');
  const errors: ParseError[] = [];
  const root = parseTree(text, errors, { disallowComments: true });
  if (errors.length > 0 || root === undefined) {
    return { faults: errors.length > 0 ? errors.map((error) => syntaxFault(text, error)) : [emptyFault()] };
  }
  const twice = doubledField(root);
  if (twice !== null) {
    return {
      faults: [
        { line: lineOf(text, twice.offset), field: fieldOf(getNodePath(twice)), message: 'is given twice' },
      ],
    };
  }
  const result = flowNetDocument.safeParse(upgradeDocument(JSON.parse(text)), {
    error: z.locales.en().localeError,
  });
  if (result.success) {
    const faults = entityFaults(result.data, text, root);
    return faults.length > 0 ? { faults } : { document: result.data };
  }
  return {
    faults: result.error.issues.map((issue) => ({
      line: lineOf(text, nearestNode(root, issue.path).offset),
      field: fieldOf(issue.path),
      message: issue.message,
    })),
  };
}

/** Entities under another id than their own, two of one id, and two of a kind of which a net has one. */
function entityFaults(document: FlowNetDocument, text: string, root: Node): NetFileFault[] {
  const seen = new Set<string>();
  return Object.entries(document.entities).flatMap(([key, entity]) => {
    const found = faultOfEntity(key, entity, seen);
    if (found === null) return [];
    const path = ['entities', key, ...found.path];
    return [
      {
        line: lineOf(text, nearestNode(root, path).offset),
        field: fieldOf(path),
        message: found.message,
      },
    ];
  });
}

function faultOfEntity(
  key: string,
  { id, value: { kind } }: VersionedEntity,
  seen: Set<string>,
): { path: string[]; message: string } | null {
  const own = id.toLowerCase();
  if (own !== key.toLowerCase())
    return { path: ['id'], message: 'is another id than the one it stands under' };
  if (seen.has(own)) return { path: ['id'], message: 'is the id of another entity too' };
  if (seen.has(kind)) return { path: ['value', 'kind'], message: `is a second ${kind}, and a net has one` };
  seen.add(own);
  if (SINGLE_KINDS.includes(kind)) seen.add(kind);
  return null;
}

function emptyFault(): NetFileFault {
  return { line: 1, field: '', message: 'The file is empty' };
}

function syntaxFault(text: string, error: ParseError): NetFileFault {
  const words = printParseErrorCode(error.error)
    .replace(/([a-z])([A-Z])/g, '$1 $2')
    .toLowerCase();
  return { line: lineOf(text, error.offset), field: '', message: `This is not JSON: ${words}` };
}

/** The node of a path, or of its nearest parent when the field itself is missing. */
function nearestNode(root: Node, path: readonly PropertyKey[]): Node {
  for (let length = path.length; length > 0; length -= 1) {
    const node = findNodeAtLocation(root, path.slice(0, length).map(segmentOf));
    if (node !== undefined) return node;
  }
  return root;
}

function segmentOf(key: PropertyKey): string | number {
  return typeof key === 'number' ? key : String(key);
}

/** A field that one object gives twice: JSON readers disagree on which of the two holds. */
function doubledField(node: Node): Node | null {
  const seen = new Set<unknown>();
  for (const child of node.children ?? []) {
    const key = node.type === 'object' ? child.children?.[0]?.value : undefined;
    if (key !== undefined && seen.has(key)) return child.children?.[1] ?? child;
    if (key !== undefined) seen.add(key);
    const inner = doubledField(node.type === 'object' ? (child.children?.[1] ?? child) : child);
    if (inner !== null) return inner;
  }
  return null;
}

function lineOf(text: string, offset: number): number {
  return text.slice(0, offset).split('\n').length;
}

function fieldOf(path: readonly PropertyKey[]): string {
  return path.map(String).join('.');
}

import { PDFArray, PDFDict, PDFName, type PDFObject } from 'pdf-lib';
import { nameIn, numberIn, openStructure } from './pdf-structure.ts';
import { refusals } from './refusal.ts';

/** The only key length that ISO 32000-2:2020 (7.6.2, Table 20) gives version 4 of the encryption. */
const VERSION_4_BITS = 128;

/**
 * Refuses a PDF that programs read differently: one shows what another leaves out, and nobody could tell which of
 * them shows what was drawn. `shownPages` is the renderer's own count. @throws RenderRefusal
 */
export async function refuseUnsoundPdf(file: string, shownPages: number): Promise<void> {
  const found = await readFacts(file);
  if (!found) return;
  if (found.keyBits !== null && found.keyBits < VERSION_4_BITS) throw refusals.unclearEncryption();
  if (found.statedPages === null) return;
  if (found.statedPages !== shownPages || found.leaves > shownPages) {
    throw refusals.unclearPages(found.statedPages, Math.max(found.leaves, shownPages));
  }
}

interface PdfFacts {
  /** Length of the key of version 4 of the encryption; null for every other file. */
  keyBits: number | null;
  /** As the page tree's root says; null when it is encrypted and cannot be read here. */
  statedPages: number | null;
  /** Different pages that the tree leads to. */
  leaves: number;
}

async function readFacts(file: string): Promise<PdfFacts | null> {
  try {
    const document = await openStructure(file);
    if (!document) return null;
    const encryption = document.context.lookup(document.context.trailerInfo.Encrypt);
    const pages = document.catalog.lookup(PDFName.of('Pages'));
    return {
      keyBits: encryption instanceof PDFDict ? keyBits(encryption) : null,
      statedPages: pages instanceof PDFDict ? numberIn(pages, 'Count', 0) : null,
      leaves: countLeaves(document.catalog, document.catalog.get(PDFName.of('Pages'))),
    };
  } catch {
    // What this reader cannot make out, the renderer proper decides.
    return null;
  }
}

/** Stated in bits, or for the crypt filter in bytes; the filter's counts when the dictionary states none. */
function keyBits(encryption: PDFDict): number | null {
  if (nameIn(encryption, 'Filter') !== 'Standard' || numberIn(encryption, 'V', 0) !== 4) return null;
  const filters = encryption.lookupMaybe(PDFName.of('CF'), PDFDict);
  const filter = filters?.lookupMaybe(PDFName.of(nameIn(encryption, 'StmF') ?? 'Identity'), PDFDict);
  const ofFilter = filter ? numberIn(filter, 'Length', VERSION_4_BITS) : VERSION_4_BITS;
  return numberIn(encryption, 'Length', ofFilter < 40 ? 8 * ofFilter : ofFilter);
}

/** Each node counts once, so that a tree that leads back into itself comes to an end. */
function countLeaves(catalog: PDFDict, root: PDFObject | undefined): number {
  const seen = new Set<PDFObject>();
  const ahead = root ? [root] : [];
  let leaves = 0;
  for (let next = ahead.pop(); next; next = ahead.pop()) {
    if (seen.has(next)) continue;
    seen.add(next);
    const node = catalog.context.lookup(next);
    if (!(node instanceof PDFDict)) continue;
    const kids = node.lookup(PDFName.of('Kids'));
    if (kids instanceof PDFArray) ahead.push(...kids.asArray());
    else if (nameIn(node, 'Type') !== 'Pages') leaves++;
  }
  return leaves;
}

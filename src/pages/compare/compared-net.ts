import { formatFullDay } from '#client/lib/dates.ts';
import type { ComparedSide } from '#client/lib/paths.ts';
import { compareText as text } from '#client/text/compare.ts';
import { checkText } from '#client/text/revisions.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { SectionDto, SheetDto } from '#shared/contract/drawings.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { sectionTitle } from '#shared/text/section-title.ts';

/** One of the two nets: a draft with its reading of now, or a revision with the frozen one. */
export interface ComparedNet {
  side: ComparedSide;
  netId: string;
  damId: string;
  /** Short, to tell the two apart: "Full supply, revision A". */
  name: string;
  netName: string;
  state: string;
  section: { id: string; name: string; chainage: string };
  drawing: { id: string; number: string; revision: string; title: string };
  sheet: SheetDto;
  /** The section's part of the sheet; null where it is the whole sheet or, of a revision, not known. */
  frame: SectionDto['frame'];
  document: FlowNetDocument;
  reading: NetReading;
  engineVersion: string;
}

/** Everything of a draft but its reading, which is still to be worked out. */
export type UnreadNet = Omit<ComparedNet, 'reading'>;

export function draftOf(detail: NetDetailDto): UnreadNet {
  const { net, section, sheet, drawing, dam, document } = detail;
  return {
    side: { kind: 'net', id: net.id },
    netId: net.id,
    damId: dam.id,
    name: text.nameNow(net.name),
    netName: net.name,
    state: text.facts.draft,
    section,
    drawing,
    sheet,
    frame: section.frame,
    document,
    engineVersion: ENGINE_VERSION,
  };
}

export function frozenOf({ payload, sheet, summary }: RevisionDto): ComparedNet {
  const { document, reading, engineVersion, netId, netName, label, section, drawing, dam } = payload;
  return {
    side: { kind: 'revision', id: payload.revisionId },
    netId,
    damId: dam.id,
    name: text.nameFrozen(netName, label),
    netName,
    state: text.facts.frozen(label, formatFullDay(payload.sentAt), checkText.state[summary.state]),
    section,
    drawing,
    sheet,
    frame: null,
    document,
    reading,
    engineVersion,
  };
}

/** The two with names by which they can be told apart: by the section where nets of two sections have the same name. */
export function namedApart(one: ComparedNet, other: ComparedNet): [ComparedNet, ComparedNet] {
  if (one.name !== other.name) return [one, other];
  const [a, b] = [one, other].map(({ section, name }) => `${sectionTitle(section.name)}, ${name}`);
  if (a !== b)
    return [
      { ...one, name: a! },
      { ...other, name: b! },
    ];
  return [
    { ...one, name: `${text.one}: ${one.name}` },
    { ...other, name: `${text.other}: ${other.name}` },
  ];
}

import type { AppDeps } from '#server/app-deps.ts';
import { SheetEntity } from '#server/entities/drawing-entity.ts';
import type { SectionPicture } from '#server/services/mail-dressing.ts';
import { openRevision } from '#server/services/revision-queries.ts';
import { scanRaster } from '#server/sheets/scan-picture.ts';
import { scanWidth, sectionPicture } from '#server/sheets/section-picture.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { type SectionFigure, sectionFigure } from '#shared/text/calculation-sheet/section-figure.ts';
import { sectionTitle } from '#shared/text/section-title.ts';

/** A mail waits no longer for its picture. */
const MOST_MS = 20_000;

type PictureDeps = Pick<AppDeps, 'db' | 'storage' | 'logger'>;

/**
 * The section of a revision as a mail shows it, made from what was frozen and from the sheet's tiles. Null when nothing is
 * traced, or when it cannot be made: a picture is no reason to hold a mail up.
 */
export async function revisionPicture(
  { db, storage, logger }: PictureDeps,
  revisionId: string,
): Promise<SectionPicture | null> {
  try {
    const { payload } = await openRevision(db.manager, revisionId);
    const whole = sectionFigure(payload.document, payload.reading);
    if (whole === null) return null;
    const figure = payload.blindFirst ? linesAlone(whole) : whole;
    const sheet = await db.manager.findOneByOrFail(SheetEntity, { id: payload.sheet.id });
    const wanted = { crop: figure.crop, wantedPx: scanWidth(figure.crop) };
    const scan = await scanRaster(storage, sheet, wanted, AbortSignal.timeout(MOST_MS));
    return { ...(await sectionPicture(figure, scan)), alt: pictureAlt(payload, figure) };
  } catch (error) {
    logger.warn({ err: error, revisionId }, 'a mail goes without its picture');
    return null;
  }
}

/** Who is to read the net alone first gets neither figures by mail nor where the points lie. */
const linesAlone = (figure: SectionFigure): SectionFigure => ({
  ...figure,
  points: [],
  profiles: [],
  lines: figure.lines.map((line) => ({ ...line, label: '' })),
});

/** What the picture shows, for readers who do not see it. */
function pictureAlt({ section, label }: RevisionPayload, { lines, points }: SectionFigure): string {
  const of = (kind: string) => lines.filter((line) => line.kind === kind).length;
  const counted = [
    count(of('equipotential'), 'equipotential'),
    count(of('flowLine'), 'flow line'),
    count(points.length, 'reading point'),
  ].join(', ');
  return `${sectionTitle(section.name)} as frozen with revision ${label}: the traced net over the scan, with ${counted}.`;
}

const count = (n: number, word: string) => `${n} ${word}${n === 1 ? '' : 's'}`;

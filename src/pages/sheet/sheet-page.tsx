import { useSuspenseQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { useParams } from 'react-router-dom';
import { Button, ButtonLink } from '#client/components/button.tsx';
import { revisionQuery } from '#client/features/revisions/api/revision-queries.ts';
import { paths } from '#client/lib/paths.ts';
import { calculationSheetText as text } from '#client/text/calculation-sheet.ts';
import { commonText } from '#client/text/common.ts';
import { sheetContent } from '#shared/text/calculation-sheet/content.ts';
import { revisionSource } from '#shared/text/calculation-sheet/revision-source.ts';
import { Block, Facts } from './sheet-blocks.tsx';
import { SheetFigure } from './sheet-figure.tsx';

/** The calculation sheet of a revision on the screen, to be read or printed: the content is that of the PDF. */
export function SheetPage() {
  const { revisionId = '' } = useParams();
  const { data: revision } = useSuspenseQuery(revisionQuery(revisionId));
  const content = useMemo(() => {
    const { payload, summary, notes, review } = revision;
    const { hash } = summary;
    return sheetContent(revisionSource({ payload, hash, summary, review, notes, jobNumber: '' }));
  }, [revision]);
  return (
    <main id="content" className="mx-auto w-full max-w-[62.5rem] bg-white px-6 py-5 text-base print:p-0">
      <title>{`${content.title} – ${commonText.product}`}</title>
      <div className="mb-3 flex gap-2 print:hidden">
        <Button look="main" onClick={() => window.print()}>
          {text.print}
        </Button>
        <ButtonLink to={paths.revision(revisionId)}>{text.backToCheck}</ButtonLink>
      </div>
      <h1 className="mt-0 mb-2 text-lg">{content.title}</h1>
      {content.figure ? (
        <SheetFigure figure={content.figure} sheet={revision.sheet} label={content.title} />
      ) : null}
      <div className="my-3 border border-ink p-2">
        <Facts rows={content.titleBlock} />
      </div>
      {content.chapters.map((chapter) => (
        <section key={chapter.id} aria-labelledby={chapter.id}>
          <h2 id={chapter.id} className="mt-4 mb-1 break-after-avoid text-md font-bold">
            {chapter.title}
          </h2>
          {chapter.blocks.map((block, at) => (
            // biome-ignore lint/suspicious/noArrayIndexKey: blocks of a frozen sheet keep their places
            <Block key={at} block={block} />
          ))}
        </section>
      ))}
      <p className="mt-4 text-sm break-all text-ink-2">{content.foot}</p>
    </main>
  );
}

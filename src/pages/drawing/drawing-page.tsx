import { useSuspenseQuery } from '@tanstack/react-query';
import { useParams, useSearchParams } from 'react-router-dom';
import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { damQuery } from '#client/features/dams/api/dam-queries.ts';
import { drawingQuery } from '#client/features/drawings/api/drawing-queries.ts';
import { OriginalFile } from '#client/features/drawings/components/original-file.tsx';
import { TitleForm } from '#client/features/drawings/components/title-form.tsx';
import { formatFullDay } from '#client/lib/dates.ts';
import { paths } from '#client/lib/paths.ts';
import { damsText } from '#client/text/dams.ts';
import { drawingFacts, drawingName, drawingsText as text } from '#client/text/drawings.ts';
import { AppFrame } from '../app-frame.tsx';
import { useDamLive } from '../use-dam-live.ts';
import { DrawingPreparation } from './drawing-preparation.tsx';
import { PutDrawingAway } from './put-drawing-away.tsx';
import { SheetPart } from './sheet-part.tsx';

export function DrawingPage() {
  const { drawingId = '' } = useParams();
  const { data: drawing } = useSuspenseQuery(drawingQuery(drawingId));
  const { data: dam } = useSuspenseQuery(damQuery(drawing.damId));
  useDamLive(drawing.damId);
  const [search] = useSearchParams();
  const page = Number(search.get('sheet') ?? '1');
  const sheet = drawing.sheets.find((each) => each.pageNumber === page) ?? drawing.sheets[0];
  const name = drawingName(drawing);
  const can = drawing.archivedAt === null && dam.archivedAt === null ? dam.can : [];
  const trail = [
    { label: damsText.title, to: paths.dams },
    { label: dam.name, to: paths.dam(dam.id) },
    { label: name },
  ];
  return (
    <AppFrame trail={trail}>
      <Page
        title={`${name}, ${dam.name}`}
        heading={name}
        lead={`${drawingFacts(drawing)}. ${text.drawingLead(drawing.uploadedBy.name, formatFullDay(drawing.uploadedAt))}`.replace(
          /^\. /,
          '',
        )}
        action={dam.can.includes('drawing.archive') ? <PutDrawingAway drawing={drawing} name={name} /> : null}
      >
        {drawing.archivedAt === null ? null : (
          <p className="mt-0 mb-4 border-l-[3px] border-attention bg-film px-3 py-2">
            {text.drawingIsPutAway}
          </p>
        )}
        <DrawingPreparation drawing={drawing} canEdit={can.includes('drawing.edit')} />
        {sheet ? <SheetPart key={sheet.id} drawing={drawing} sheet={sheet} can={can} /> : null}
        <div className="mt-4 grid grid-cols-[minmax(0,1fr)] gap-4 lg:grid-cols-2">
          <Panel title={text.fields}>
            <TitleForm key={drawing.id} drawing={drawing} canEdit={can.includes('drawing.edit')} />
          </Panel>
          <Panel title={text.original}>
            <OriginalFile drawing={drawing} />
          </Panel>
        </div>
      </Page>
    </AppFrame>
  );
}

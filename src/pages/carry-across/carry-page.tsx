import { useQuery, useSuspenseQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useParams } from 'react-router-dom';
import { SelectField } from '#client/components/field.tsx';
import { Page } from '#client/components/page.tsx';
import { Empty } from '#client/components/panel.tsx';
import { damQuery } from '#client/features/dams/api/dam-queries.ts';
import { drawingListQuery, drawingQuery } from '#client/features/drawings/api/drawing-queries.ts';
import { paths } from '#client/lib/paths.ts';
import { carryAcrossText as text } from '#client/text/carry-across.ts';
import { damsText } from '#client/text/dams.ts';
import { drawingName } from '#client/text/drawings.ts';
import type { DrawingDto, SectionDto, SheetDto } from '#shared/contract/drawings.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { AppFrame } from '../app-frame.tsx';
import { NotFoundPage } from '../error/not-found-page.tsx';
import { Carrying } from './carrying.tsx';

/** A section and its nets taken over to another sheet of the dam, by places marked on both. */
export function CarryPage() {
  const { drawingId = '', sectionId = '' } = useParams();
  const { data: drawing } = useSuspenseQuery(drawingQuery(drawingId));
  const section = drawing.sections.find((each) => each.id === sectionId);
  const sheet = drawing.sheets.find((each) => each.id === section?.sheetId);
  return section && sheet ? (
    <FromSection drawing={drawing} section={section} sheet={sheet} />
  ) : (
    <NotFoundPage />
  );
}

interface FromSectionProps {
  drawing: DrawingDto;
  section: SectionDto;
  sheet: SheetDto;
}

function FromSection({ drawing, section, sheet }: FromSectionProps) {
  const { data: dam } = useSuspenseQuery(damQuery(drawing.damId));
  const { data: drawings } = useSuspenseQuery(drawingListQuery(drawing.damId, false));
  const [sheetId, setSheetId] = useState<string | null>(null);
  const targets = drawings.flatMap((each) =>
    each.sheets.filter((other) => other.id !== sheet.id).map((other) => ({ drawing: each, sheet: other })),
  );
  const target = targets.find((each) => each.sheet.id === sheetId);
  const label = sectionLabel(section);
  const trail = [
    { label: damsText.title, to: paths.dams },
    { label: dam.name, to: paths.dam(dam.id) },
    { label: drawingName(drawing), to: paths.drawing(drawing.id, sheet.pageNumber) },
    { label: text.button },
  ];
  return (
    <AppFrame trail={trail}>
      <Page title={text.title(label)} heading={text.title(label)} lead={text.lead}>
        {targets.length === 0 ? (
          <Empty>{text.noOther}</Empty>
        ) : (
          <SelectField
            label={text.chooseDrawing}
            className="mb-4 max-w-xl"
            value={sheetId ?? ''}
            onChange={(event) => setSheetId(event.target.value || null)}
          >
            <option value="">{text.noneChosen}</option>
            {targets.map((each) => (
              <option key={each.sheet.id} value={each.sheet.id}>
                {`${drawingName(each.drawing)}, ${text.sheetNumber(each.sheet.pageNumber)}`}
              </option>
            ))}
          </SelectField>
        )}
        {target ? (
          <WithTarget
            key={target.sheet.id}
            from={{ drawing, section, sheet }}
            drawingId={target.drawing.id}
            sheetId={target.sheet.id}
          />
        ) : null}
      </Page>
    </AppFrame>
  );
}

/** The list of drawings leaves out what only the drawing itself says. */
function WithTarget({
  from,
  drawingId,
  sheetId,
}: {
  from: FromSectionProps;
  drawingId: string;
  sheetId: string;
}) {
  const { data: drawing } = useQuery(drawingQuery(drawingId));
  const sheet = drawing?.sheets.find((each) => each.id === sheetId);
  return drawing && sheet ? <Carrying from={from} to={{ drawing, sheet }} /> : null;
}

import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { CheckField } from '#client/components/field.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { Empty, Panel } from '#client/components/panel.tsx';
import { ShownBy } from '#client/features/clean-up/components/shown-by.tsx';
import { useCreateSection, useEditSection } from '#client/features/drawings/api/drawing-mutations.ts';
import { isUnderWay } from '#client/features/drawings/api/drawing-queries.ts';
import { DrawAgain } from '#client/features/drawings/components/draw-again.tsx';
import type { Frame } from '#client/features/drawings/components/frame.ts';
import { PagePicker } from '#client/features/drawings/components/page-picker.tsx';
import { SectionForm } from '#client/features/drawings/components/section-form.tsx';
import { SectionItem } from '#client/features/drawings/components/section-item.tsx';
import { SheetWithFrames } from '#client/features/drawings/components/sheet-with-frames.tsx';
import { cleanUpText } from '#client/text/clean-up.ts';
import { drawingName, drawingsText as text } from '#client/text/drawings.ts';
import type { DamAction } from '#shared/contract/actions.ts';
import type { DrawingDto, SectionDto, SheetDto } from '#shared/contract/drawings.ts';

interface SheetAndSectionsProps {
  drawing: DrawingDto;
  sheet: SheetDto;
  can: readonly DamAction[];
  /** Null where the sheet may not be cleaned up. */
  onCleanUp: (() => void) | null;
}

/** A section being framed: a new one, or one that is changed. */
interface Framing {
  section: SectionDto | undefined;
  frame: Frame | null;
}

/** One sheet at the left, its sections at the right; while a section is framed, a drag on the sheet sets its frame. */
export function SheetAndSections({ drawing, sheet, can, onCleanUp }: SheetAndSectionsProps) {
  const [framing, setFraming] = useState<Framing | null>(null);
  const [showPutAway, setShowPutAway] = useState(false);
  const all = drawing.sections.filter((section) => section.sheetId === sheet.id);
  const sections = all.filter((section) => showPutAway || section.archivedAt === null);
  const onFrame = (frame: Frame | null) => setFraming(framing && { ...framing, frame });
  const framed = sections.filter(
    (section) => section.archivedAt === null && section.id !== framing?.section?.id,
  );
  // Once something lies on the sheet its pixels stay what they are.
  const canDrawAgain =
    sheet.isDrawn === true &&
    all.length === 0 &&
    sheet.shown === undefined &&
    !isUnderWay(drawing) &&
    can.includes('drawing.edit');
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-4 lg:grid-cols-[minmax(0,1fr)_360px]">
      <Panel
        look="register"
        className="min-w-0 self-start"
        title={text.sheet(sheet.pageNumber)}
        action={
          <>
            <SheetFacts sheet={sheet} />
            {onCleanUp && !framing ? (
              <Button look="quiet" onClick={onCleanUp}>
                {cleanUpText.cleanUp}
              </Button>
            ) : null}
          </>
        }
      >
        <PagePicker sheets={drawing.sheets} chosen={sheet} />
        {sheet.shown ? <ShownBy sheetId={sheet.id} canChange={can.includes('drawing.edit')} /> : null}
        {canDrawAgain && sheet.dpi !== null ? <DrawAgain sheet={sheet} drawnDpi={sheet.dpi} /> : null}
        {sheet.note ? (
          <p className="m-0 border-b border-rule bg-doubt px-3.5 py-2 text-attention">{sheet.note}</p>
        ) : null}
        <div className="bg-desk p-3.5 max-sm:p-1.5">
          <SheetWithFrames
            sheet={sheet}
            drawingName={drawingName(drawing)}
            sections={framed}
            framing={framing ? { frame: framing.frame, onFrame } : undefined}
          />
        </div>
      </Panel>
      <Panel
        // On a phone the sheet comes first while a frame is dragged on it, otherwise the list.
        className={framing ? 'self-start' : 'self-start max-lg:order-first'}
        title={text.sections}
        action={
          can.includes('section.edit') && !framing ? (
            <Button look="main" onClick={() => setFraming({ section: undefined, frame: null })}>
              {text.newSection}
            </Button>
          ) : null
        }
      >
        {framing ? (
          <FramedSection sheet={sheet} framing={framing} onFrame={onFrame} onDone={() => setFraming(null)} />
        ) : (
          <SectionList
            drawingId={drawing.id}
            sections={sections}
            can={can}
            showPutAway={showPutAway}
            onEdit={(section) => setFraming({ section, frame: section.frame })}
          />
        )}
        {framing || !hasPutAway(all) ? null : (
          <div className="px-3.5 py-2.5 text-sm">
            <CheckField
              label={text.showPutAwayHere}
              checked={showPutAway}
              onChange={(event) => setShowPutAway(event.target.checked)}
            />
          </div>
        )}
      </Panel>
    </div>
  );
}

const hasPutAway = (sections: readonly SectionDto[]) =>
  sections.some(
    (section) => section.archivedAt !== null || section.nets.some((net) => net.archivedAt !== null),
  );

const SheetFacts = ({ sheet }: { sheet: SheetDto }) => (
  <span className="text-sm text-ink-2">{text.sheetSize(sheet.widthPx, sheet.heightPx, sheet.dpi)}</span>
);

interface SectionListProps {
  drawingId: string;
  sections: readonly SectionDto[];
  can: readonly DamAction[];
  showPutAway: boolean;
  onEdit: (section: SectionDto) => void;
}

function SectionList({ drawingId, sections, can, showPutAway, onEdit }: SectionListProps) {
  if (sections.length === 0)
    return <Empty>{can.includes('section.edit') ? text.noSections : text.noSectionsReader}</Empty>;
  return (
    <ul className="m-0 list-none p-0">
      {sections.map((section) => (
        <SectionItem
          key={section.id}
          drawingId={drawingId}
          section={section}
          can={can}
          showPutAway={showPutAway}
          onEdit={() => onEdit(section)}
        />
      ))}
    </ul>
  );
}

interface FramedSectionProps {
  sheet: SheetDto;
  framing: Framing;
  onFrame: (frame: Frame | null) => void;
  onDone: () => void;
}

function FramedSection({ sheet, framing, onFrame, onDone }: FramedSectionProps) {
  const create = useCreateSection(sheet.id);
  const edit = useEditSection(framing.section?.id ?? '');
  const notice = useNotice();
  const write = framing.section ? edit : create;
  const done = () => {
    notice(framing.section ? text.sectionSaved : text.sectionMade);
    onDone();
  };
  return (
    <SectionForm
      sheet={sheet}
      section={framing.section}
      frame={framing.frame}
      onFrame={onFrame}
      error={write.error}
      busy={write.isPending}
      onSubmit={(fields) => write.mutate(fields, { onSuccess: done })}
      onCancel={onDone}
    />
  );
}

import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button, ButtonLink } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { paths } from '#client/lib/paths.ts';
import { carryAcrossText } from '#client/text/carry-across.ts';
import { drawingsText as text } from '#client/text/drawings.ts';
import { netFileText } from '#client/text/net-files.ts';
import type { DamAction } from '#shared/contract/actions.ts';
import type { SectionDto } from '#shared/contract/drawings.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { useArchive, useCreateNet } from '../api/drawing-mutations.ts';
import { NameDialog } from './name-dialog.tsx';
import { NetFileDialog } from './net-file-dialog.tsx';
import { NetItem } from './net-item.tsx';

interface SectionItemProps {
  drawingId: string;
  section: SectionDto;
  can: readonly DamAction[];
  showPutAway: boolean;
  onEdit: () => void;
}

/** One section: where it is cut, whether it is to scale, and its nets. */
export function SectionItem({ drawingId, section, can, showPutAway, onEdit }: SectionItemProps) {
  const label = sectionLabel(section);
  const isAway = section.archivedAt !== null;
  const nets = section.nets.filter((net) => showPutAway || net.archivedAt === null);
  return (
    <li className="border-b border-rule px-3.5 py-2.5">
      <h3 className="m-0 text-base font-bold break-words">{label}</h3>
      <p className={`m-0 text-sm ${section.calibrated ? 'text-good' : 'text-attention'}`}>
        {section.calibrated ? text.calibrated : text.notCalibrated}
        {isAway ? `, ${text.putAwayMark}` : ''}
      </p>
      {nets.length > 0 ? (
        <ul aria-label={text.nets} className="mx-0 mt-2 mb-0 list-none p-0">
          {nets.map((net) => (
            <NetItem
              key={net.id}
              net={net}
              canTrace={can.includes('net.trace') && !isAway}
              canArchive={can.includes('net.archive')}
            />
          ))}
        </ul>
      ) : null}
      {can.includes('section.edit') ? (
        <SectionActions drawingId={drawingId} section={section} label={label} onEdit={onEdit} />
      ) : null}
    </li>
  );
}

function SectionActions({
  drawingId,
  section,
  label,
  onEdit,
}: {
  drawingId: string;
  section: SectionDto;
  label: string;
  onEdit: () => void;
}) {
  const [asking, setAsking] = useState<'new' | 'file' | null>(null);
  const archive = useArchive('sections', section.id);
  const notice = useNotice();
  const isAway = section.archivedAt !== null;
  const putAway = () =>
    archive.mutate(!isAway, {
      onSuccess: () => notice(isAway ? text.broughtBack(label) : text.putAwayDone(label)),
    });
  return (
    <>
      <ProblemNote error={archive.error} />
      <div className="mt-2 flex flex-wrap gap-2">
        {isAway ? null : (
          <>
            <Button aria-label={text.newNetOf(label)} onClick={() => setAsking('new')}>
              {text.newNet}
            </Button>
            <Button look="quiet" aria-label={netFileText.buttonOf(label)} onClick={() => setAsking('file')}>
              {netFileText.button}
            </Button>
            <Button look="quiet" aria-label={text.editSectionOf(label)} onClick={onEdit}>
              {text.editSection}
            </Button>
            <ButtonLink
              look="quiet"
              aria-label={carryAcrossText.buttonOf(label)}
              to={paths.carryAcross(drawingId, section.id)}
            >
              {carryAcrossText.button}
            </ButtonLink>
          </>
        )}
        <Button
          look="quiet"
          aria-label={isAway ? text.bringBackOf(label) : text.putAwayOf(label)}
          busy={archive.isPending}
          onClick={putAway}
        >
          {isAway ? text.bringBack : text.putAway}
        </Button>
      </div>
      {asking === 'new' ? (
        <NewNetDialog section={section} label={label} onClose={() => setAsking(null)} />
      ) : null}
      {asking === 'file' ? (
        <NetFileDialog
          title={netFileText.title(label)}
          lead={netFileText.lead}
          target={{ sectionId: section.id }}
          onClose={() => setAsking(null)}
        />
      ) : null}
    </>
  );
}

/** A new net opens on the desk at once: that is what it was made for. */
function NewNetDialog({
  section,
  label,
  onClose,
}: {
  section: SectionDto;
  label: string;
  onClose: () => void;
}) {
  const create = useCreateNet(section.id);
  const navigate = useNavigate();
  return (
    <NameDialog
      title={text.newNetOf(label)}
      lead={text.newNetLead}
      initial={section.nets.length === 0 ? text.defaultLoadCase : ''}
      submitLabel={text.makeNet}
      error={create.error}
      busy={create.isPending}
      onClose={onClose}
      onSubmit={(name) => create.mutate(name, { onSuccess: (net) => void navigate(paths.net(net.id)) })}
    />
  );
}

import { useState } from 'react';
import { Link } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { Panel } from '#client/components/panel.tsx';
import { Part } from '#client/components/part.tsx';
import { DrawingRegister } from '#client/features/drawings/components/drawing-register.tsx';
import { NetFileDialog } from '#client/features/drawings/components/net-file-dialog.tsx';
import { UploadButtons } from '#client/features/drawings/components/upload-buttons.tsx';
import { UploadList } from '#client/features/drawings/components/upload-list.tsx';
import { useDroppedFiles, usePastedFiles } from '#client/features/drawings/upload/incoming-files.ts';
import { uploadQueue, useUploads } from '#client/features/drawings/upload/use-uploads.ts';
import { paths } from '#client/lib/paths.ts';
import { drawingsText as text } from '#client/text/drawings.ts';
import { netFileText } from '#client/text/net-files.ts';
import { registerLinkText } from '#client/text/register-links.ts';
import type { DamDto } from '#shared/contract/dams.ts';

/** The register of drawings, and every way in which a file comes to it. */
export function DrawingsPanel({ dam, archived }: { dam: DamDto; archived: boolean }) {
  const canUpload = dam.can.includes('drawing.upload') && dam.archivedAt === null;
  const [isTakingNet, setIsTakingNet] = useState(false);
  const uploads = useUploads(dam.id);
  const takeFiles = (files: File[]) => uploadQueue.add(dam.id, files);
  const isOver = useDroppedFiles(canUpload, takeFiles);
  usePastedFiles(canUpload, takeFiles);
  return (
    <Panel
      look="register"
      className="self-start"
      title={archived ? `${text.title}, ${text.putAwayMark}` : text.title}
      action={
        canUpload ? (
          <>
            <Button look="quiet" aria-label={netFileText.blankTitle} onClick={() => setIsTakingNet(true)}>
              {netFileText.button}
            </Button>
            <UploadButtons onFiles={takeFiles} />
          </>
        ) : null
      }
    >
      <UploadList uploads={uploads} />
      <Part>
        <DrawingRegister damId={dam.id} archived={archived} canUpload={canUpload} />
      </Part>
      {canUpload ? (
        <p className="mx-3.5 my-3 border-[1.5px] border-dashed border-rule p-3.5 text-center text-ink-2">
          {text.dropHint}
        </p>
      ) : null}
      <p className="m-0 flex flex-wrap gap-x-5 gap-y-1 px-3.5 pb-2.5 text-sm">
        <Link to={paths.register(dam.id)}>{registerLinkText.ofDam}</Link>
        <Link to={archived ? '?' : '?show=put-away'}>{archived ? text.hidePutAway : text.showPutAway}</Link>
      </p>
      {isTakingNet ? (
        <NetFileDialog
          title={netFileText.blankTitle}
          lead={netFileText.blankLead}
          target={{ damId: dam.id }}
          onClose={() => setIsTakingNet(false)}
        />
      ) : null}
      {isOver ? (
        <div className="fixed inset-2 z-40 grid place-items-center border-[3px] border-dashed border-equipotential bg-film/90 text-lg font-bold">
          {text.dropHere(dam.name)}
        </div>
      ) : null}
    </Panel>
  );
}

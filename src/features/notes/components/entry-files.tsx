import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { Actions, Dialog } from '#client/components/dialog.tsx';
import { downloadFrom } from '#client/lib/download.ts';
import { notesText as text } from '#client/text/notes.ts';
import type { NoteFileDto } from '#shared/contract/notes.ts';
import { noteFileUrl } from '../api/note-queries.ts';
import { ACTION } from './note-looks.ts';

/** Pictures that the browser shows; others are downloaded. */
const SHOWN = ['image/png', 'image/jpeg', 'image/webp'];

/** Photographs of an entry, small and each with a view of its own, and its other files as downloads. */
export function EntryFiles({ netId, files }: { netId: string; files: readonly NoteFileDto[] }) {
  const [viewed, setViewed] = useState<NoteFileDto | null>(null);
  if (files.length === 0) return null;
  const pictures = files.filter((file) => SHOWN.includes(file.mediaType));
  const others = files.filter((file) => !SHOWN.includes(file.mediaType));
  return (
    <div className="mt-1 flex flex-wrap items-center gap-x-2 gap-y-1">
      {pictures.map((file) => (
        <button
          key={file.id}
          type="button"
          className="border border-rule bg-film p-0.5 hover:border-ink"
          aria-label={text.viewPicture(file.fileName)}
          title={file.fileName}
          onClick={() => setViewed(file)}
        >
          <img
            src={noteFileUrl(netId, file.id)}
            alt=""
            loading="lazy"
            decoding="async"
            className="block size-16 object-cover"
          />
        </button>
      ))}
      {others.map((file) => (
        <button
          key={file.id}
          type="button"
          className={`${ACTION} break-all`}
          onClick={() => downloadFrom(noteFileUrl(netId, file.id))}
        >
          {file.fileName}
        </button>
      ))}
      {viewed ? <PictureView netId={netId} file={viewed} onClose={() => setViewed(null)} /> : null}
    </div>
  );
}

function PictureView({ netId, file, onClose }: { netId: string; file: NoteFileDto; onClose: () => void }) {
  const url = noteFileUrl(netId, file.id);
  return (
    <Dialog title={file.fileName} onClose={onClose} full>
      <img src={url} alt={file.fileName} className="mx-auto block max-h-[75dvh] max-w-full" />
      <Actions>
        <Button onClick={onClose}>{text.closeView}</Button>
        <Button look="text" onClick={() => downloadFrom(url)}>
          {text.download}
        </Button>
      </Actions>
    </Dialog>
  );
}

import { useId } from 'react';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { notesText as text } from '#client/text/notes.ts';
import type { useNoteFiles } from '../hooks/use-note-files.ts';
import { ACTION } from './note-looks.ts';

/** Kinds that the server takes; it looks at the bytes itself. */
const TAKEN = 'image/png,image/jpeg,image/webp,image/tiff,application/pdf';

/** The files of the text being written, each with how far it is, and the way to add more. */
export function FilesToAttach({ attached }: { attached: ReturnType<typeof useNoteFiles> }) {
  const id = useId();
  return (
    <div className="flex flex-col gap-1">
      <ul className="m-0 list-none p-0 empty:hidden">
        {attached.files.map((each) => (
          <li key={each.id} className="text-sm">
            <div className="flex flex-wrap items-baseline gap-x-3">
              <span className="min-w-0 break-all">{each.file.name}</span>
              {each.state === 'sending' ? <span className="text-ink-2">{text.sendingFile}</span> : null}
              {each.state === 'failed' ? (
                <button type="button" className={ACTION} onClick={() => attached.again(each)}>
                  {text.tryFileAgain}
                </button>
              ) : null}
              <button type="button" className={ACTION} onClick={() => attached.leaveOut(each.id)}>
                {text.removeFile(each.file.name)}
              </button>
            </div>
            <ProblemNote error={each.error} />
          </li>
        ))}
      </ul>
      {attached.fault ? <p className="m-0 text-sm text-wrong">{attached.fault}</p> : null}
      <label htmlFor={id} className={`${ACTION} self-start focus-within:outline-2`}>
        {text.attach}
        <input
          id={id}
          type="file"
          multiple
          accept={TAKEN}
          className="sr-only"
          onChange={(event) => {
            attached.add([...(event.target.files ?? [])]);
            // The same file may be chosen again after it was left out.
            event.target.value = '';
          }}
        />
      </label>
    </div>
  );
}

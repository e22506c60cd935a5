import { useRef } from 'react';
import { Button } from '#client/components/button.tsx';
import { drawingsText as text } from '#client/text/drawings.ts';
import { ACCEPTED } from '../upload/incoming-files.ts';

/** The main button of the register, and on a phone or tablet the camera. */
export function UploadButtons({ onFiles }: { onFiles: (files: File[]) => void }) {
  return (
    <>
      <span className="hidden pointer-coarse:inline">
        <FileButton label={text.photo} accept="image/*" capture="environment" onFiles={onFiles} />
      </span>
      <FileButton label={text.add} accept={ACCEPTED} multiple main onFiles={onFiles} />
    </>
  );
}

interface FileButtonProps {
  label: string;
  accept: string;
  capture?: 'environment';
  multiple?: boolean;
  main?: boolean;
  onFiles: (files: File[]) => void;
}

function FileButton({ label, accept, capture, multiple, main, onFiles }: FileButtonProps) {
  const input = useRef<HTMLInputElement>(null);
  return (
    <>
      <input
        ref={input}
        type="file"
        className="hidden"
        aria-label={label}
        tabIndex={-1}
        accept={accept}
        capture={capture}
        multiple={multiple}
        onChange={(event) => {
          onFiles([...(event.target.files ?? [])]);
          // The same file chosen again is a new choice.
          event.target.value = '';
        }}
      />
      <Button look={main ? 'main' : 'plain'} onClick={() => input.current?.click()}>
        {label}
      </Button>
    </>
  );
}

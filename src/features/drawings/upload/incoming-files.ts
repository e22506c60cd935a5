import { useEffect, useRef, useState } from 'react';
import { drawingsText as text } from '#client/text/drawings.ts';

/** What the file chooser offers first; the type is told from the content on the server, never from the name. */
export const ACCEPTED =
  '.tif,.tiff,.pdf,.jpg,.jpeg,.png,.webp,image/tiff,application/pdf,image/jpeg,image/png,image/webp';

const hasFiles = (event: DragEvent) => event.dataTransfer?.types.includes('Files') ?? false;

/** Takes files dropped anywhere on the page; true while files are dragged over it. */
export function useDroppedFiles(enabled: boolean, onFiles: (files: File[]) => void): boolean {
  const [isOver, setIsOver] = useState(false);
  const take = useLatest(onFiles);
  useEffect(() => {
    if (!enabled) return;
    // Enter and leave are told for every element on the way; their balance says whether the pointer is still inside.
    let depth = 0;
    const enter = (event: DragEvent) => {
      if (!hasFiles(event)) return;
      depth += 1;
      setIsOver(true);
    };
    const leave = (event: DragEvent) => {
      if (!hasFiles(event)) return;
      depth = Math.max(0, depth - 1);
      if (depth === 0) setIsOver(false);
    };
    const over = (event: DragEvent) => {
      if (hasFiles(event)) event.preventDefault();
    };
    const drop = (event: DragEvent) => {
      if (!hasFiles(event)) return;
      event.preventDefault();
      depth = 0;
      setIsOver(false);
      take.current([...(event.dataTransfer?.files ?? [])]);
    };
    const listeners = { dragenter: enter, dragleave: leave, dragover: over, drop } as const;
    for (const [name, listener] of Object.entries(listeners))
      window.addEventListener(name, listener as EventListener);
    return () => {
      for (const [name, listener] of Object.entries(listeners))
        window.removeEventListener(name, listener as EventListener);
    };
  }, [enabled, take]);
  return isOver;
}

/** Takes files and pictures pasted while no text field has the focus. */
export function usePastedFiles(enabled: boolean, onFiles: (files: File[]) => void): void {
  const take = useLatest(onFiles);
  useEffect(() => {
    if (!enabled) return;
    const paste = (event: ClipboardEvent) => {
      const files = [...(event.clipboardData?.files ?? [])];
      if (files.length === 0 || isTextField(event.target)) return;
      event.preventDefault();
      take.current(files.map((file) => withPastedName(file, new Date())));
    };
    window.addEventListener('paste', paste);
    return () => window.removeEventListener('paste', paste);
  }, [enabled, take]);
}

const isTextField = (target: EventTarget | null) =>
  target instanceof HTMLElement && target.matches('input, textarea, [contenteditable]');

/** A picture from the clipboard is always called image.png; the time tells several apart. */
export function withPastedName(file: File, now: Date): File {
  if (!/^image\.\w+$/.test(file.name)) return file;
  const stamp = now.toISOString().slice(0, 19).replace('T', ' ').replaceAll(':', '.');
  const extension = file.name.split('.').at(-1) ?? 'png';
  return new File([file], text.pastedName(stamp, extension), { type: file.type });
}

function useLatest<T>(value: T) {
  const latest = useRef(value);
  useEffect(() => {
    latest.current = value;
  });
  return latest;
}

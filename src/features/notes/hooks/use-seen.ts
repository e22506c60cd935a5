import { type RefObject, useEffect, useRef } from 'react';
import type { NoteDto } from '#shared/contract/notes.ts';
import { useMarkRead } from '../api/note-mutations.ts';

/** Milliseconds a note is in view before it counts as read; scrolling past is no reading. */
const SEEN_MS = 1500;
/** How often it is looked whether a note is still in view. */
const STEP_MS = 250;

/** Marks a note as read once its end has been in view for a while, in a page that is itself shown. */
export function useSeen(item: RefObject<HTMLElement | null>, note: NoteDto): void {
  const { mutate } = useMarkRead(note.netId);
  const read = useRef(mutate);
  useEffect(() => {
    read.current = mutate;
  });
  const { id, unread } = note;
  const entries = note.entries.length;
  useEffect(() => {
    const element = item.current;
    if (unread === 0 || !element) return;
    let inView = false;
    let seenMs = 0;
    // A note longer than the pane is never in view whole.
    const observer = new IntersectionObserver(
      ([entry]) => {
        inView = entry !== undefined && (entry.intersectionRatio > 0.6 || fillsView(entry));
      },
      { threshold: [0, 0.3, 0.6, 0.9] },
    );
    observer.observe(element);
    const timer = setInterval(() => {
      seenMs = inView && document.visibilityState === 'visible' ? seenMs + STEP_MS : 0;
      if (seenMs < SEEN_MS) return;
      clearInterval(timer);
      read.current({ noteId: id, entries });
    }, STEP_MS);
    return () => {
      observer.disconnect();
      clearInterval(timer);
    };
  }, [item, id, unread, entries]);
}

const fillsView = ({ intersectionRect, rootBounds }: IntersectionObserverEntry) =>
  rootBounds !== null && intersectionRect.height > rootBounds.height / 3;

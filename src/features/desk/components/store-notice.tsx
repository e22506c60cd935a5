import { useStore } from 'zustand';
import { deskPageText as text } from '#client/text/desk-page.ts';
import type { DeskStore } from '../model/desk-state.ts';

/** A step that was refused, with the reason, until it is read or the next step succeeds. */
export function StoreNotice({ store }: { store: DeskStore }) {
  const notice = useStore(store, (state) => state.notice);
  if (notice === null) return null;
  return (
    <p role="alert" className="m-0 flex items-baseline gap-3 border-b border-rule bg-doubt px-3 py-1.5">
      <span>{notice}</span>
      <button type="button" className="touch ml-auto underline" onClick={() => store.setNotice(null)}>
        {text.noticeClose}
      </button>
    </p>
  );
}

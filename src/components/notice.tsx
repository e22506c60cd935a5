import { createContext, type ReactNode, useCallback, useContext, useEffect, useState } from 'react';
import { commonText } from '#client/text/common.ts';

const SHOWN_MS = 6000;
const NoticeContext = createContext<(text: string) => void>(() => {});

/** Says in one line at the foot of the window that something was done. Never for errors: those stay where they happened. */
export const useNotice = (): ((text: string) => void) => useContext(NoticeContext);

export function NoticeProvider({ children }: { children: ReactNode }) {
  const [notice, setNotice] = useState<{ text: string; key: number } | null>(null);
  const show = useCallback((text: string) => setNotice({ text, key: Date.now() }), []);
  useEffect(() => {
    if (!notice) return;
    const timer = setTimeout(() => setNotice(null), SHOWN_MS);
    return () => clearTimeout(timer);
  }, [notice]);
  return (
    <NoticeContext value={show}>
      {children}
      <div
        role="status"
        className="pointer-events-none fixed inset-x-0 bottom-3 z-30 flex justify-center px-3"
      >
        {notice ? (
          <p className="pointer-events-auto m-0 flex items-center gap-3 rounded-sheet border border-ink bg-ink px-3 py-1.5 text-white">
            {notice.text}
            <button type="button" className="underline" onClick={() => setNotice(null)}>
              {commonText.close}
            </button>
          </p>
        ) : null}
      </div>
    </NoticeContext>
  );
}

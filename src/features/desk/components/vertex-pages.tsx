import { editingText } from '#client/text/editing-lines.ts';
import { PAGE_POINTS } from './vertex-rows.ts';

const text = editingText.vertices;
const LOOK = 'touch border-0 bg-transparent px-1 underline disabled:no-underline disabled:opacity-55';

interface VertexPagesProps {
  first: number;
  last: number;
  count: number;
  /** Turns to the page that holds a point, counted from 0. */
  onGo: (index: number) => void;
}

/** The pages of a table of many points; nothing where one page holds them all. */
export function VertexPages({ first, last, count, onGo }: VertexPagesProps) {
  if (count <= PAGE_POINTS) return null;
  return (
    <nav aria-label={text.pages} className="flex items-center gap-3 py-1 text-sm">
      <button type="button" className={LOOK} disabled={first === 0} onClick={() => onGo(first - PAGE_POINTS)}>
        {text.earlier}
      </button>
      <span aria-live="polite" className="mx-auto">
        {text.range(first + 1, last + 1, count)}
      </span>
      <button
        type="button"
        className={LOOK}
        disabled={last >= count - 1}
        onClick={() => onGo(first + PAGE_POINTS)}
      >
        {text.later}
      </button>
    </nav>
  );
}

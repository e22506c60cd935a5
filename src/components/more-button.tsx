import { commonText } from '#client/text/common.ts';
import { Button } from './button.tsx';

interface MoreButtonProps {
  label: string;
  /** The list read a page at a time. */
  query: { hasNextPage: boolean; isFetchingNextPage: boolean; fetchNextPage: () => Promise<unknown> };
}

/** Reads the next page of a list; nothing on the last one. */
export function MoreButton({ label, query }: MoreButtonProps) {
  if (!query.hasNextPage) return null;
  return (
    <div className="p-3.5">
      <Button
        busy={query.isFetchingNextPage}
        busyLabel={commonText.loading}
        onClick={() => void query.fetchNextPage()}
      >
        {label}
      </Button>
    </div>
  );
}

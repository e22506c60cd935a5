import { lazy, Suspense } from 'react';
import { useSearchParams } from 'react-router-dom';
import { Loading } from '#client/components/loading.tsx';
import type { DamAction } from '#shared/contract/actions.ts';
import type { DrawingDto, SheetDto } from '#shared/contract/drawings.ts';
import { SheetAndSections } from './sheet-and-sections.tsx';

const CleanUp = lazy(async () => ({
  default: (await import('#client/features/clean-up/components/clean-up.tsx')).CleanUp,
}));

interface SheetPartProps {
  drawing: DrawingDto;
  sheet: SheetDto;
  can: readonly DamAction[];
}

/** The sheet with its sections, or being cleaned up: the address says which, so that a reload keeps it. */
export function SheetPart({ drawing, sheet, can }: SheetPartProps) {
  const [search, setSearch] = useSearchParams();
  const go = (isCleaned: boolean) => {
    const next = new URLSearchParams(search);
    if (isCleaned) next.set('clean-up', 'yes');
    else next.delete('clean-up');
    setSearch(next);
  };
  const canCleanUp = can.includes('drawing.edit') && sheet.tiles.readyZoom === undefined;
  if (canCleanUp && search.has('clean-up')) {
    return (
      <Suspense fallback={<Loading />}>
        <CleanUp sheet={sheet} onBack={() => go(false)} />
      </Suspense>
    );
  }
  return (
    <SheetAndSections
      drawing={drawing}
      sheet={sheet}
      can={can}
      onCleanUp={canCleanUp ? () => go(true) : null}
    />
  );
}

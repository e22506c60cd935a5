import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { useStore } from 'zustand';
import { useNotice } from '#client/components/notice.tsx';
import { Panel } from '#client/components/panel.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { netQuery } from '#client/features/desk/api/net-queries.ts';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import { paths } from '#client/lib/paths.ts';
import { carryAcrossText as text } from '#client/text/carry-across.ts';
import { drawingName } from '#client/text/drawings.ts';
import type { MatchShape, SheetMatch } from '#shared/compute/carry-across/match-sheets.ts';
import type { DrawingDto, SectionDto, SheetDto } from '#shared/contract/drawings.ts';
import { carriedGuides } from './carried-guides.ts';
import { CarryForm } from './carry-form.tsx';
import { MatchFacts } from './match-facts.tsx';
import { matchingOf } from './matching.ts';
import { MatchingSheet } from './matching-sheet.tsx';
import { createMatchingStore, markedPlaces, removePlace } from './matching-store.ts';
import { PlacesTable } from './places-table.tsx';
import { useCarryAcross } from './use-carry-across.ts';

interface CarryingProps {
  from: { drawing: DrawingDto; section: SectionDto; sheet: SheetDto };
  to: { drawing: DrawingDto; sheet: SheetDto };
}

/** Both sheets with their places, how well they agree, and what is carried. */
export function Carrying({ from, to }: CarryingProps) {
  const [stores] = useState(() => ({
    from: createMatchingStore(from.sheet),
    to: createMatchingStore(to.sheet),
  }));
  const [shape, setShape] = useState<MatchShape>('similarity');
  const fromDocument = useStore(stores.from, (state) => state.document);
  const toDocument = useStore(stores.to, (state) => state.document);
  const places = useMemo(() => markedPlaces(fromDocument, toDocument), [fromDocument, toDocument]);
  const matching = useMemo(() => matchingOf(places, shape), [places, shape]);
  const nets = from.section.nets.filter((net) => net.archivedAt === null);
  usePreview(stores.to, nets[0]?.id, matching.match);
  const carry = useCarryAcross(to.sheet.id);
  const navigate = useNavigate();
  const notice = useNotice();
  const submit = (name: string, netIds: readonly string[]) =>
    carry.mutate(
      {
        name,
        netIds,
        shape,
        fromSectionId: from.section.id,
        places: matching.pairs.map((pair) => ({ from: [...pair.from], to: [...pair.to] })),
      },
      {
        onSuccess: ({ told }) => {
          notice([text.carried(name), ...told].join(' '));
          void navigate(paths.drawing(to.drawing.id, to.sheet.pageNumber));
        },
      },
    );
  const remove = (name: string) => {
    removePlace(stores.from, name, text.remove(name));
    removePlace(stores.to, name, text.remove(name));
  };
  return (
    <>
      <div className="grid grid-cols-[minmax(0,1fr)] gap-4 lg:grid-cols-2">
        <MatchingSheet
          heading={text.fromSheet(drawingName(from.drawing))}
          store={stores.from}
          sheet={from.sheet}
        />
        <MatchingSheet heading={text.toSheet(drawingName(to.drawing))} store={stores.to} sheet={to.sheet} />
      </div>
      <div className="mt-4 grid grid-cols-[minmax(0,1fr)] gap-4 lg:grid-cols-2">
        <Panel title={text.places} className="self-start">
          <PlacesTable places={places} residuals={matching.residuals} onRemove={remove} />
          <MatchFacts matching={matching} shape={shape} onShape={setShape} />
        </Panel>
        <Panel title={text.carry} className="self-start">
          <ProblemNote error={carry.error} />
          <CarryForm
            sectionName={from.section.name}
            nets={nets}
            ready={matching.match !== null}
            busy={carry.isPending}
            onSubmit={submit}
          />
        </Panel>
      </div>
    </>
  );
}

/** The lines of a net over the new sheet, as they would lie by the places marked so far. */
function usePreview(store: DeskStore, netId: string | undefined, match: SheetMatch | null): void {
  const { data: net } = useQuery({ ...netQuery(netId ?? ''), enabled: netId !== undefined });
  useEffect(() => {
    store.setGuides('carried', net && match ? carriedGuides(net.document, match) : null);
  }, [store, net, match]);
}

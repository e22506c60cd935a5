import { useStore } from 'zustand';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import type { Finding } from '#shared/contract/reading.ts';
import type { DeskChecks } from '../model/desk-checks.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { BoundaryKind, ToolId } from '../model/tool-choice.ts';
import { CountForm } from './count-form.tsx';
import type { DeskFormProps } from './desk-form.ts';
import { IndependentPane } from './independent-pane.tsx';
import { LineForm } from './line-form.tsx';
import { LoadCasePane } from './load-case-pane.tsx';
import { MeasuredForm } from './measured-form.tsx';
import { NetCheckPane } from './net-check-pane.tsx';
import { PermeabilityForm } from './permeability-form.tsx';
import { PointForm } from './point-form.tsx';
import { GridProfileForm, PasteProfileForm } from './profile-forms.tsx';
import { ReadingPane } from './reading-pane.tsx';
import { SeepagePane } from './seepage-pane.tsx';
import { SetOutForm } from './set-out-form.tsx';
import { SeveralForm } from './several-form.tsx';
import { SoilForm } from './soil-form.tsx';
import { WaterForm } from './water-form.tsx';

/** What is open in the margin in the place of the notes. */
export type MarginForm =
  | {
      form:
        | 'loadCase'
        | 'water'
        | 'permeability'
        | 'count'
        | 'point'
        | 'findings'
        | 'independent'
        | 'seepage';
    }
  | { form: 'pasteProfile' | 'gridProfile' }
  /** `placedId`: the known point just placed, whose offset is typed next. */
  | { form: 'setOut'; placedId?: string }
  | { form: 'line'; lineId: string }
  /** Whatever is chosen at once. */
  | { form: 'several' }
  | { form: 'soil'; soilId: string }
  | { form: 'measured'; pointId: string }
  /** How a point is read; `byChoice`: opened because the point was chosen, beside whatever is being done. */
  | { form: 'reading'; pointId: string; byChoice?: boolean };

interface MarginFormProps {
  open: MarginForm;
  store: DeskStore;
  checks: DeskChecks;
  detail: NetDetailDto;
  flush: () => Promise<void>;
  onOpen: (form: MarginForm) => void;
  onClose: () => void;
  /** Shows the sheet, where it is not beside the form already. */
  onSheet: () => void;
}

/** The form that is open, wired to the store. */
export function MarginFormPane({
  open,
  store,
  checks,
  detail,
  flush,
  onOpen,
  onClose,
  onSheet,
}: MarginFormProps) {
  const document = useStore(store, (state) => state.document);
  const reading = useStore(store, (state) => state.reading);
  const disabled = useStore(store, (state) => state.readOnly);
  const form: DeskFormProps = {
    document,
    reading,
    disabled,
    onClose,
    run: (label, ops) => {
      store.run(label, ops);
    },
  };
  const take = (tool: ToolId, boundary?: BoundaryKind) => {
    store.setTool(tool, boundary);
    onSheet();
  };
  const openLine = (lineId: string) => {
    store.select({ kind: 'line', ids: [lineId] });
    onOpen({ form: 'line', lineId });
  };
  const showProfile = (id: string) => {
    store.select({ kind: 'profile', ids: [id] });
    onClose();
  };
  switch (open.form) {
    case 'loadCase':
      return <LoadCasePane detail={detail} disabled={disabled} flush={flush} onClose={onClose} />;
    case 'setOut':
      return <SetOutForm {...form} placedId={open.placedId ?? null} onPlace={() => take('knownPoint')} />;
    case 'water':
      return (
        <WaterForm
          {...form}
          fullSupplyLevel={detail.dam.fullSupplyLevel}
          onTrace={(boundary) => take('boundary', boundary)}
          onOpenLine={openLine}
        />
      );
    case 'permeability':
      return (
        <PermeabilityForm
          {...form}
          newId={store.newId}
          onOpenSoil={(soilId) => onOpen({ form: 'soil', soilId })}
        />
      );
    case 'soil':
      return (
        <SoilForm
          {...form}
          key={open.soilId}
          soilId={open.soilId}
          onClose={() => onOpen({ form: 'permeability' })}
          onPlace={() => {
            store.select({ kind: 'soil', ids: [open.soilId] });
            take('soilPlace');
          }}
        />
      );
    case 'count':
      return <CountForm {...form} />;
    case 'point':
      return <PointForm {...form} newId={store.newId} />;
    case 'pasteProfile':
      return <PasteProfileForm {...form} newId={store.newId} onMade={showProfile} />;
    case 'gridProfile':
      return <GridProfileForm {...form} newId={store.newId} onMade={showProfile} />;
    case 'measured':
      return <MeasuredForm {...form} key={open.pointId} pointId={open.pointId} />;
    case 'line':
      return <LineForm {...form} key={open.lineId} store={store} lineId={open.lineId} />;
    case 'several':
      return <SeveralForm store={store} disabled={disabled} onClose={onClose} />;
    case 'findings':
      return (
        <NetCheckPane
          store={store}
          checks={checks}
          onOpen={onOpen}
          onClose={onClose}
          onSheet={onSheet}
          onShow={(found) => {
            showFinding(store, found);
            onSheet();
          }}
        />
      );
    case 'seepage':
      return <SeepagePane {...form} onOpen={onOpen} />;
    case 'independent':
      return <IndependentPane store={store} checks={checks} onClose={onClose} onSheet={onSheet} />;
    case 'reading':
      return (
        <ReadingPane
          key={`${open.pointId} ${open.byChoice === true}`}
          store={store}
          checks={checks}
          pointId={open.pointId}
          keepsFocus={open.byChoice === true}
          onOpen={onOpen}
          onClose={onClose}
          onSheet={onSheet}
        />
      );
  }
}

/** Chooses on the sheet what a finding is about and brings its place into view. */
export function showFinding(store: DeskStore, found: Finding): void {
  const { document, reading } = store.getState();
  const [id] = found.entityIds;
  const value = id === undefined ? undefined : document.entities[id]?.value;
  if (id && (value?.kind === 'line' || value?.kind === 'knownPoint' || value?.kind === 'readingPoint')) {
    store.select({ kind: value.kind, ids: [id] });
  }
  const at =
    found.at ??
    (value?.kind === 'line' ? value.points[Math.floor(value.points.length / 2)] : undefined) ??
    (value?.kind === 'knownPoint' ? value.at : undefined) ??
    reading?.points.find((point) => point.id === id)?.sheetAt;
  if (at) store.lookAt(at);
}

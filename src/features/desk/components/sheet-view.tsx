import { type ReactNode, useEffect, useId, useMemo, useRef, useState } from 'react';
import { useStore } from 'zustand';
import { classNames } from '#client/components/class-names.ts';
import { deskViewText as text } from '#client/text/desk-view.ts';
import type { ScreenPx, SheetPx } from '#shared/compute/frames.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import { createCrosshair } from '../model/crosshair.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { createFollowedPlace, type FollowedPlace } from '../model/followed-place.ts';
import { createLiveHelp } from '../model/live-help-source.ts';
import { rasterOf, type SheetRaster } from '../model/sheet-raster.ts';
import type { ToolId } from '../model/tool-choice.ts';
import { createViewStore, type ViewStore } from '../model/view-store.ts';
import { type SheetFrame, toScreen, type Viewport } from '../model/viewport.ts';
import type { NoteBalloon } from '../render/build-scene.ts';
import { aboveFinger } from './above-finger.ts';
import { CrosshairBar } from './crosshair-bar.tsx';
import { CrosshairMark } from './crosshair-mark.tsx';
import { DraftActions } from './draft-actions.tsx';
import { EditPrompt } from './edit-prompt.tsx';
import { EntityTableDialog } from './entity-table-dialog.tsx';
import { GridSwitch } from './grid-switch.tsx';
import { KeyListDialog } from './key-list.tsx';
import { LiveHelp } from './live-help.tsx';
import { MAGNIFIER_SIDE_PX, Magnifier } from './magnifier.tsx';
import { PictureButton } from './picture-button.tsx';
import type { PictureFacts } from './picture-plan.ts';
import { PointerReadout } from './pointer-readout.tsx';
import { RulerAtPointer } from './ruler-at-pointer.tsx';
import { RulerPanel } from './ruler-panel.tsx';
import { SectionViewSwitch } from './section-view-switch.tsx';
import { HiddenHint, SheetAids } from './sheet-aids.tsx';
import { createSheetController, type SheetController } from './sheet-controller.ts';
import { SheetMore } from './sheet-more.tsx';
import { useOpenedSheet } from './use-opened-sheet.ts';
import { ZoomBar } from './zoom-bar.tsx';

type SheetViewProps = {
  store: DeskStore;
  sheet: SheetDto;
  /** By which the sheet is shown; without one it is shown as it was scanned. Another raster needs another `key`. */
  raster?: SheetRaster;
  /** A control of what is shown, beside those of how. */
  pictureSwitch?: ReactNode;
  /** The section's part of the sheet, shown when fitted; null = the whole sheet. */
  frame: SheetFrame | null;
  notes: readonly NoteBalloon[];
  /** Accessible name: which section of which drawing is shown. */
  label: string;
  className?: string;
  /** The view of this sheet, where somebody else follows or moves it too; another one needs another `key`. */
  views?: ViewStore;
  /** What the title block of a picture says; left out where none is made. */
  picture?: () => PictureFacts;
};

/**
 * The sheet with its traces: pans, zooms and feeds the tool in hand. A read-only store shows it without tools. Another
 * sheet needs another `key`, because the view and its tiles belong to one sheet.
 */
export function SheetView({
  store,
  sheet,
  raster,
  pictureSwitch,
  frame,
  notes,
  label,
  className,
  views: given,
  picture,
}: SheetViewProps) {
  const opened = useOpenedSheet(sheet);
  const element = useRef<HTMLDivElement>(null);
  const layers = useRef<HTMLDivElement>(null);
  const shownNotes = useRef(notes);
  // The frame comes as a new array with every answer of the server; the view keeps the one it was made with.
  const outline = useRef(frame);
  const [shown] = useState(() => raster ?? rasterOf(sheet, true));
  const [views] = useState(() => given ?? createViewStore(shown, frame));
  const [crosshair] = useState(createCrosshair);
  const help = useMemo(() => createLiveHelp(store), [store]);
  const [controller, setController] = useState<SheetController | null>(null);
  const [followed] = useState(createFollowedPlace);
  const [panning, setPanning] = useState(false);
  const [finger, setFinger] = useState<ScreenPx | null>(null);
  const tool = useStore(store, (state) => state.tool);
  const helpId = useId();

  useEffect(() => {
    if (element.current === null || layers.current === null) return;
    const made = createSheetController({
      element: element.current,
      layers: layers.current,
      sheet: opened,
      raster: shown,
      frame: outline.current,
      store,
      views,
      notes: () => shownNotes.current,
      help,
      crosshair,
      followed,
      onPanning: setPanning,
      onFinger: setFinger,
    });
    setController(made);
    return () => {
      setController(null);
      made.destroy();
    };
  }, [opened, shown, store, views, help, crosshair, followed]);

  useEffect(() => {
    // A cleaned-up picture is made when its sheet is ready.
    if (sheet.shown === undefined) controller?.renderer.sharpen(sheet.tiles);
  }, [sheet, controller]);

  useEffect(() => {
    shownNotes.current = notes;
    controller?.refresh();
  }, [notes, controller]);

  return (
    <div
      ref={element}
      // By which the link at the head of the page and the keys find it.
      data-sheet
      role="application"
      aria-label={label}
      aria-describedby={helpId}
      tabIndex={controller === null ? -1 : 0}
      data-panning={panning || undefined}
      className={classNames(
        // Panels over the sheet are never higher than it; what takes the focus does not move the sheet.
        '[container-type:size] group/sheet relative touch-none select-none overflow-clip bg-desk focus-visible:outline-none',
        panning ? 'cursor-grabbing' : cursorFor(tool),
        className,
      )}
    >
      <div ref={layers} className="absolute inset-0" />
      {/* The ring of the focus is no outline of what holds the canvases: the page would be painted anew with each of their frames. */}
      <span
        aria-hidden="true"
        data-focus-ring
        className="pointer-events-none absolute inset-0 hidden outline-2 -outline-offset-3 outline-focus group-focus-visible/sheet:block"
      />
      <span id={helpId} className="sr-only">
        {text.keysHelp}
      </span>
      <LiveHelp store={store} views={views} source={help} touched={finger !== null} />
      <CrosshairMark crosshair={crosshair} views={views} />
      <RulerAtPointer store={store} views={views} />
      {/*
        Down to the labels of the grid, which stand along the foot. What is only read lets clicks through to the sheet;
        where letters are large and the sheet is low, the panels at the foot scroll instead of covering the buttons.
      */}
      <div className="pointer-events-none absolute inset-x-3 top-3 bottom-8 flex flex-col justify-between gap-2 sm:inset-x-4 sm:top-3.5">
        <div className="relative flex flex-none flex-wrap items-start justify-between gap-2 @2xl:flex-nowrap [&>*]:pointer-events-auto">
          <PointerReadout store={store} />
          <div className="pointer-events-none! ml-auto flex flex-wrap items-start justify-end gap-2 [&_[data-over-sheet]]:pointer-events-auto">
            <SheetMore
              store={store}
              views={
                <>
                  {pictureSwitch}
                  <SectionViewSwitch store={store} views={views} />
                </>
              }
            >
              <GridSwitch store={store} />
              <SheetAids store={store} noteCount={notes.length} />
              {picture && (
                <PictureButton
                  of={{ store, views, raster: newest(shown, sheet), frame, notes, facts: picture }}
                />
              )}
            </SheetMore>
            <ZoomBar views={views} />
          </div>
        </div>
        <div className="-m-1 flex min-h-0 flex-wrap items-end justify-between gap-2 overflow-auto p-1 [&_[data-over-sheet]]:pointer-events-auto">
          <div className="flex flex-col items-start gap-2">
            <HiddenHint store={store} />
            <CrosshairBar
              store={store}
              crosshair={crosshair}
              sheet={sheet}
              onLeave={() => element.current?.focus()}
            />
            <RulerPanel store={store} />
            <EditPrompt store={store} />
            <DraftActions store={store} onAction={(action) => controller?.act(action)} />
          </div>
          <MagnifierCorner followed={followed} views={views}>
            {controller && finger === null && (
              <Magnifier store={store} renderer={controller.renderer} followed={followed} />
            )}
          </MagnifierCorner>
        </div>
      </div>
      <KeyListDialog store={store} />
      <EntityTableDialog store={store} />
      {controller && finger !== null && (
        <div className="absolute" style={aboveFinger(finger, MAGNIFIER_SIDE_PX, views.getState().view)}>
          <Magnifier store={store} renderer={controller.renderer} followed={followed} />
        </div>
      )}
    </div>
  );
}

/** The raster with the finest tiles that are made by now. */
function newest(raster: SheetRaster, { tiles }: SheetDto): SheetRaster {
  return raster.tiles.rendition === tiles.rendition ? { ...raster, tiles } : raster;
}

const MAGNIFIER_CORNER_PX = 230;

type MagnifierCornerProps = { followed: FollowedPlace; views: ViewStore; children: ReactNode };

/** The magnified view stands on the right; when the pointer is about to go under it, on the other side. */
function MagnifierCorner({ followed, views, children }: MagnifierCornerProps) {
  const isUnder = useStore(followed, ({ at }) => isUnderMagnifier(at, views.getState().view));
  return <div className={isUnder ? 'order-first' : 'ml-auto'}>{children}</div>;
}

function isUnderMagnifier(at: SheetPx | null, view: Viewport): boolean {
  if (at === null) return false;
  const [x, y] = toScreen(view, at);
  return x > view.widthPx - MAGNIFIER_CORNER_PX && y > view.heightPx - MAGNIFIER_CORNER_PX;
}

function cursorFor(tool: ToolId): string {
  return tool === 'select' ? 'cursor-default' : 'cursor-crosshair';
}

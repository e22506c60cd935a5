import { type ScreenPx, type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { planeInverse, SAME_PLACE, throughPlane } from '#shared/compute/plane-map.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import { clickedPlacesOf } from '../model/clicked-places.ts';
import type { CrosshairStore } from '../model/crosshair.ts';
import { createCrossingClient } from '../model/crossing-client.ts';
import type { DeskState, DeskStore } from '../model/desk-state.ts';
import { drawingWayChoice } from '../model/drawing-way.ts';
import type { FollowedPlace } from '../model/followed-place.ts';
import { createInkClient } from '../model/ink-client.ts';
import type { LiveHelpSource } from '../model/live-help-source.ts';
import { asksForLine, pressSets } from '../model/press-meaning.ts';
import { rulerOf } from '../model/ruler.ts';
import { settingOutAids } from '../model/setting-out-aids.ts';
import type { SheetRaster } from '../model/sheet-raster.ts';
import { lineChoiceOf } from '../model/tool-choice.ts';
import { NO_OVERLAY, type ToolOverlay } from '../model/tool-overlay.ts';
import type { ViewStore } from '../model/view-store.ts';
import { type SheetFrame, sheetZoom, type Viewport } from '../model/viewport.ts';
import {
  buildDragged,
  buildSheetScene,
  type NoteBalloon,
  noteIdOf,
  partScene,
  type SceneInput,
} from '../render/build-scene.ts';
import { createGridLayer } from '../render/grid-layer.ts';
import { onceAFrame } from '../render/once-a-frame.ts';
import { overlayScene } from '../render/overlay-scene.ts';
import { LABEL_PREFIX, type WordPlaces } from '../render/place-words.ts';
import { rulerItems } from '../render/ruler-items.ts';
import type { SceneItem } from '../render/scene.ts';
import { itemsThrough } from '../render/seen-through.ts';
import { createSheetRenderer, type SheetRenderer } from '../render/sheet-renderer.ts';
import { createToolHost, type HostView, type ToolHost } from '../tools/tool-host.ts';
import type { Balloon, Modifiers } from '../tools/tool-types.ts';
import { createCrosshairHand } from './crosshair-hand.ts';
import { deskKey, isTyping, sheetKey } from './desk-keys.ts';
import { sheetEditKeyUp } from './edit-keys.ts';
import { attachGestures } from './pointer-gestures.ts';

const KEYBOARD_REACH_PX = 8;

export type SheetControllerOptions = {
  readonly element: HTMLElement;
  /** Under everything else in the element: the canvases go in here. */
  readonly layers: HTMLElement;
  readonly sheet: SheetDto;
  /** By which the sheet is shown. */
  readonly raster: SheetRaster;
  readonly frame: SheetFrame | null;
  readonly store: DeskStore;
  readonly views: ViewStore;
  notes(): readonly NoteBalloon[];
  /** What is told beside the pointer; follows it from here. */
  readonly help: LiveHelpSource;
  readonly crosshair: CrosshairStore;
  /** Is told the place being set with the magnified view. */
  readonly followed: FollowedPlace;
  onPanning(panning: boolean): void;
  /** Where a finger holds something to be placed, or null: the magnified view then stands clear of it. */
  onFinger(at: ScreenPx | null): void;
};

export type SheetController = {
  readonly renderer: SheetRenderer;
  readonly host: ToolHost;
  /** To be called when the notes have changed. */
  refresh(): void;
  act(type: 'finish' | 'takeBack' | 'cancel'): void;
  destroy(): void;
};

/** Holds a sheet view together outside of React: stores to scenes, pointers and keys to tools. */
export function createSheetController(options: SheetControllerOptions): SheetController {
  const { element, sheet, store, views } = options;
  const renderer = createSheetRenderer(options.layers, options.raster, dueScene);
  const ink = createInkClient(sheet);
  const crossings = createCrossingClient(sheet);
  const grid = createGridLayer(options.layers);
  const host = createToolHost(store, ink, crossings);
  const clicked = clickedPlacesOf(store);
  let pointer: { at: SheetPx; keys: Modifiers; view: HostView } | null = null;
  let overlay: ToolOverlay = NO_OVERLAY;
  let fingerHolds = false;
  let due: 'nothing' | 'overlay' | 'scene' = 'nothing';
  const frame = onceAFrame(showDue, 'scene');
  const helping = onceAFrame(
    () => options.help.follow(pointer?.at ?? null, overlay, sheetZoom(view())),
    'told',
  );
  let scene: readonly SceneItem[] = [];
  /** Labels for which there is no room, by their ids. */
  let crowded: ReadonlyMap<string, SceneItem> = new Map();
  let words: { readonly zoom: number; readonly places: WordPlaces } | null = null;
  let active: readonly SceneItem[] = [];
  /** Of what is being worked on, that which is not dragged. */
  let resting: readonly SceneItem[] = [];
  let builtFor: { readonly state: DeskState; readonly input: SceneInput } | null = null;

  const view = () => views.getState().view;
  const balloons = (): Balloon[] => balloonsOf(scene, view(), options.notes());
  const keyView = (): HostView => ({
    zoom: sheetZoom(view()),
    reachPx: KEYBOARD_REACH_PX,
    balloons: balloons(),
  });

  function showDue(): void {
    if (due === 'scene') showScene();
    else if (due === 'overlay') showOverlay();
  }

  function showScene(): void {
    due = 'nothing';
    const state = store.getState();
    const input = sceneInput(state);
    if (onlyDrags(state)) {
      active = [...resting, ...buildDragged(input)];
      showOverlay();
      return;
    }
    const built = buildSheetScene(input);
    scene = built.items;
    words = { zoom: view().zoom, places: built.places };
    crowded = new Map(built.crowded.map((label) => [label.id, label]));
    renderer.setScanLook({ faded: state.aids.fadePct / 100, inverted: state.aids.inverted });
    const parts = partScene(scene);
    active = parts.active;
    renderer.showBase(parts.base);
    keepForDrag(state, input, parts);
    showOverlay();
    showGrid();
  }

  function sceneInput(state: DeskState): SceneInput {
    return {
      document: state.document,
      preview: state.preview,
      reading: state.reading,
      selection: state.selection,
      draftId: state.draft?.lineId ?? null,
      hiddenKinds: state.hiddenKinds,
      notes: options.notes(),
      guides: state.guides,
      map: host.map(),
      readOnly: state.readOnly,
      zoom: view().zoom,
      lineWeight: state.aids.lineWeight,
      keptWords: isDragging(state) && words?.zoom === view().zoom ? words.places : null,
      seenAs: view().seenAs ?? null,
      frame: options.frame,
      clickedOn: clicked.among,
    };
  }

  /** When what is dragged lies wholly among what is being worked on, the next movements build nothing else anew. */
  function keepForDrag(state: DeskState, input: SceneInput, parts: ReturnType<typeof partScene>): void {
    const dragged = new Set(isDragging(state) ? buildDragged(input).map(({ id }) => id) : []);
    const isWhole = dragged.size > 0 && !parts.base.some(({ id }) => dragged.has(id));
    builtFor = isWhole ? { state, input } : null;
    resting = parts.active.filter(({ id }) => !dragged.has(id));
  }

  /** True when since the last scene nothing but the place of what is dragged has changed. */
  function onlyDrags(state: DeskState): boolean {
    if (builtFor === null) return false;
    const { state: before, input } = builtFor;
    return (
      input.zoom === view().zoom &&
      input.seenAs === (view().seenAs ?? null) &&
      !looksDiffer({ ...state, preview: before.preview }, before) &&
      Object.keys(state.preview).join() === Object.keys(before.preview).join()
    );
  }

  function showGrid(): void {
    grid.show(settingOutAids.getState().showsGrid ? host.map() : null, view());
  }

  /** One scene for all that changes in a frame; it brings along what is under the pointer. */
  function dueScene(): void {
    due = 'scene';
    frame.due();
  }

  function dueOverlay(): void {
    if (due === 'nothing') due = 'overlay';
    frame.due();
  }

  function showOverlay(): void {
    due = 'nothing';
    const { tool, boundaryKind } = store.getState();
    overlay =
      pointer === null
        ? NO_OVERLAY
        : host.overlay(pointer.at, pointer.keys, { ...pointer.view, zoom: sheetZoom(view()) });
    const underPointer = overlayScene(overlay, lineChoiceOf(tool, boundaryKind)?.line ?? null);
    const measured = tool === 'ruler' ? rulerItems(rulerOf(store).getState()) : [];
    const pointedAt = itemsThrough([...measured, ...underPointer], view().seenAs ?? null);
    renderer.showActive([...active, ...crowdedAtPointer(), ...pointedAt]);
    const pointsByKeys = options.crosshair.getState().at !== null;
    const magnified = (overlay.magnify || fingerHolds || pointsByKeys) && pointer !== null;
    helping.due();
    const at = magnified ? (overlay.drawnCrossing ?? overlay.snap?.at ?? pointer!.at) : null;
    if (at !== options.followed.getState().at) options.followed.setState({ at });
  }

  /** A label that finds no room on the sheet is shown while its line is pointed at. */
  function crowdedAtPointer(): readonly SceneItem[] {
    if (crowded.size === 0 || pointer === null || isDragging(store.getState())) return [];
    const lineId = host.lineAt(pointer.at, { ...pointer.view, zoom: sheetZoom(view()) });
    const label = lineId === null ? undefined : crowded.get(`${LABEL_PREFIX}${lineId}`);
    return label === undefined ? [] : [label];
  }

  /** A mouse that lies still leaves the sheet to the crosshair. */
  function followMouse(at: SheetPx | null, keys: Modifiers, view: HostView): void {
    if (options.crosshair.getState().at === null) followPointer(at, keys, view);
  }

  function followPointer(at: SheetPx | null, keys: Modifiers, view: HostView): void {
    pointer = at === null ? null : { at, keys, view };
    store.setPointer(at === null ? null : [at[0], at[1]]);
    dueOverlay();
    // What stands clear of the pointer must do so before a press that follows in the same frame.
    if (!isDragging(store.getState())) showDue();
  }

  function holdByFinger(at: ScreenPx | null): void {
    fingerHolds = at !== null;
    options.onFinger(at);
  }

  function key(event: KeyboardEvent): void {
    if (event.defaultPrevented || isTyping(event.target)) return;
    const inSheet = event.target === element;
    const used =
      (inSheet && sheetKey(event, { store, views, host, hostView: keyView, crosshair: hand })) ||
      deskKey(event, { store });
    if (used) event.preventDefault();
  }

  const keyUp = (event: KeyboardEvent) => sheetEditKeyUp(event, { store });
  /** A move by arrow keys of which the end is not heard, as when the window is left with the key held. */
  const settle = () => store.requestEdit({ type: 'settle' });

  ink.onLook(() => pointer !== null && dueOverlay());
  crossings.onLook(() => pointer !== null && dueOverlay());
  const hand = createCrosshairHand({
    element,
    store,
    views,
    host,
    crosshair: options.crosshair,
    hostView: keyView,
    onPointer: followPointer,
  });
  const sizes = new ResizeObserver(() => views.resize(element.clientWidth, element.clientHeight));
  sizes.observe(element);
  views.resize(element.clientWidth, element.clientHeight);
  const endings = [
    hand.end,
    attachGestures({
      element,
      views,
      host,
      balloons,
      places: () => pressSets(store.getState()),
      pointsAt: () => asksForLine(store.getState()),
      onPointer: followMouse,
      onPanning: options.onPanning,
      onFinger: holdByFinger,
    }),
    store.subscribe((state, before) => looksDiffer(state, before) && dueScene()),
    store.onEditRequest((event) => host.edit(event, keyView())),
    // What is asked for is answered on the sheet, by a click or with the keys that work there.
    store.subscribe(({ pendingEdit }, before) => {
      if (pendingEdit !== null && pendingEdit !== before.pendingEdit) element.focus({ preventScroll: true });
    }),
    drawingWayChoice.subscribe(dueOverlay),
    settingOutAids.subscribe(() => {
      dueOverlay();
      showGrid();
    }),
    rulerOf(store).subscribe(dueOverlay),
    store.onLookAt((at) => views.lookAt(sheetPx(...at))),
    views.subscribe((state, before) => {
      renderer.setView(state.view);
      showGrid();
      // What depends on the zoom is made anew once it rests; the renderer tells.
      if (state.view.seenAs !== before.view.seenAs) dueScene();
    }),
  ];
  element.ownerDocument.addEventListener('keydown', key);
  element.addEventListener('keyup', keyUp);
  element.addEventListener('blur', settle);
  if (views.getState().view.widthPx > 0) renderer.setView(views.getState().view);
  showScene();

  return {
    renderer,
    host,
    refresh() {
      builtFor = null;
      dueScene();
    },
    act: (type) => host.handle({ type }, keyView()),
    destroy() {
      frame.end();
      helping.end();
      sizes.disconnect();
      ink.close();
      crossings.close();
      grid.destroy();
      for (const end of endings) end();
      element.ownerDocument.removeEventListener('keydown', key);
      element.removeEventListener('keyup', keyUp);
      element.removeEventListener('blur', settle);
      store.setPointer(null);
      renderer.destroy();
    },
  };
}

/** Where the notes' balloons stand in a scene, to be met there by the pointer. */
function balloonsOf(
  scene: readonly SceneItem[],
  { zoom, seenAs }: Viewport,
  notes: readonly NoteBalloon[],
): Balloon[] {
  const lines = new Map(notes.map(({ id, lineId }) => [id, lineId]));
  const back = seenAs === undefined ? SAME_PLACE : planeInverse(seenAs);
  return scene.flatMap((item) => {
    if (item.shape !== 'balloon') return [];
    const [dx, dy] = item.offsetPx;
    const id = noteIdOf(item.id);
    const lineId = lines.get(id);
    const at = sheetPx(...throughPlane(back, item.at[0] + dx / zoom, item.at[1] + dy / zoom));
    return [lineId === undefined ? { id, at } : { id, at, lineId }];
  });
}

/** True when something that is drawn has changed; the pointer alone does not count. */
function looksDiffer(a: DeskState, b: DeskState): boolean {
  return (
    a.document !== b.document ||
    a.preview !== b.preview ||
    a.reading !== b.reading ||
    a.selection !== b.selection ||
    a.draft !== b.draft ||
    a.pendingEdit !== b.pendingEdit ||
    a.tool !== b.tool ||
    a.hiddenKinds !== b.hiddenKinds ||
    a.aids !== b.aids ||
    a.guides !== b.guides ||
    a.readOnly !== b.readOnly
  );
}

/** While something is dragged it is in the document as it was, and over it as it would be. */
function isDragging({ preview }: DeskState): boolean {
  return Object.keys(preview).length > 0;
}

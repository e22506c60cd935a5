import { useEffect, useRef, useState } from 'react';
import { deskViewText } from '#client/text/desk-view.ts';
import { liveHelpText as text } from '#client/text/tracing-aids.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { SetOut } from '#shared/compute/set-out.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { DeskState, DeskStore } from '../model/desk-state.ts';
import type { HelpShown, LiveHelpSource } from '../model/live-help-source.ts';
import type { ViewStore } from '../model/view-store.ts';
import { sheetZoom, toScreen } from '../model/viewport.ts';
import { HALO } from '../render/line-look.ts';
import { movedLayer } from '../render/moved-layer.ts';
import { onceAFrame } from '../render/once-a-frame.ts';
import { wordCanvas } from '../render/word-canvas.ts';
import { blockHeightPx, fontOf, type WordsLook } from '../render/words-block.ts';
import { type BesidePlace, besidePlace } from './beside-place.ts';
import { headWords, helpWords } from './live-help-words.ts';
import { setOutOf, wordsAt } from './pointer-readout.tsx';
import { thingWords } from './thing-words.ts';

type LiveHelpProps = {
  store: DeskStore;
  views: ViewStore;
  source: LiveHelpSource;
  /** True while a finger places: the figures then stand in the corner and not beneath the hand. */
  touched: boolean;
};

/** Figures beside the pointer while a line is drawn or a vertex dragged, and their words for whoever asks to hear them. */
export function LiveHelp(props: LiveHelpProps) {
  const { store, views, source } = props;
  return (
    <>
      <Beside {...props} />
      <Told store={store} views={views} source={source} />
    </>
  );
}

/** Room for the longest row of words and for as many as there can be, of which most stand empty. Across in sizes of a letter. */
const ROOM = { across: 32, rows: 10 } as const;
/** About the most that is told. */
const MOSTLY = { across: 23, rows: 5 } as const;
/** Under the readout of the place, which a narrow sheet shows in its second row; a finger is seldom there. */
const IN_CORNER: BesidePlace = { x: 12, y: 96, side: 'left' };
/** As many rows as a head takes: what grows and shrinks under a moving hand jumps. */
const AWAITED = [text.headAwaited, '\u00a0'];

function Beside({ store, views, source, touched }: LiveHelpProps) {
  const element = useRef<HTMLDivElement>(null);
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    if (element.current === null || canvas.current === null) return;
    return keepBeside(element.current, canvas.current, { store, views, source, touched });
  }, [store, views, source, touched]);
  return (
    // Said aloud at every movement it would drown everything else; Q tells it.
    <div
      ref={element}
      hidden
      aria-hidden="true"
      data-live-help
      className="pointer-events-none absolute top-0 left-0 text-sm font-semibold will-change-transform"
    >
      <canvas ref={canvas} className="block" />
    </div>
  );
}

/** Keeps what is told beside the pointer written in a canvas, and that beside the pointer, until it is ended. */
function keepBeside(
  element: HTMLElement,
  canvas: HTMLCanvasElement,
  { store, views, source, touched }: LiveHelpProps,
): () => void {
  const moveTo = movedLayer(element);
  const words = wordCanvas(canvas);
  let size = sizeIn(element);
  const frame = onceAFrame(() => {
    const { shown } = source.state.getState();
    const rows = shown === null ? [] : besideWords(store.getState(), shown, touched);
    if (element.hidden && rows.length > 0) {
      // Whoever has made letters larger meanwhile finds them so.
      size = sizeIn(element);
      words.dress(size.look, size.room.widthPx, size.room.heightPx);
    }
    element.hidden = rows.length === 0;
    if (shown === null || rows.length === 0) return;
    const { view } = views.getState();
    const heightPx = blockHeightPx(rows.length, size.look);
    const { x, y, side } = touched
      ? IN_CORNER
      : besidePlace(view, toScreen(view, shown.at), size.mostly, heightPx);
    words.show(rows, side);
    moveTo(`translate(${side === 'left' ? x : x - size.room.widthPx}px, ${y}px)`);
  });
  const endings = [
    source.state.subscribe(frame.due),
    views.subscribe(frame.due),
    store.subscribe(({ document, reading }, before) => {
      if (document !== before.document || reading !== before.reading) frame.due();
    }),
    frame.end,
  ];
  frame.due();
  return () => {
    for (const end of endings) end();
  };
}

/** How the words look by the class of an element, and how much room they may take and mostly do. */
function sizeIn(element: HTMLElement) {
  const { font, sizePx } = fontOf(element);
  const linePx = Math.round(1.3 * sizePx);
  // One ground as strong as the halo of the marks: a halo about each letter takes twice as long to paint.
  const ground = { paddingPx: [0, 0], groundAlpha: HALO.alpha, edged: false, gap: null } as const;
  const look: WordsLook = { font, linePx, ...ground };
  const px = ({ across, rows }: { across: number; rows: number }) => ({
    widthPx: across * sizePx,
    heightPx: blockHeightPx(rows, look),
  });
  return { look, room: px(ROOM), mostly: px(MOSTLY) };
}

function besideWords(state: DeskState, shown: HelpShown, touched: boolean): string[] {
  // In the corner they stand right under the readout, which tells the place already.
  const place = touched ? [] : wordsOfPlace(shown.at, state.document, setOutOf(state.document));
  return helpWords(shown, place, state, state.reading === null ? [] : AWAITED);
}

/** Tells, when it is asked, what stands at the pointer. */
function Told({ store, views, source }: Omit<LiveHelpProps, 'touched'>) {
  const [told, setTold] = useState('');
  useEffect(() => {
    // The same words again are only told when they are not quite the same text.
    const tell = (words: string) => setTold((now) => (now === words ? `${words}\u00a0` : words));
    return store.onIntent((intent) => {
      if (intent.type === 'tellPlace')
        void wordsNow(store, source, sheetZoom(views.getState().view)).then(tell);
    });
  }, [store, views, source]);
  return <output className="sr-only">{told}</output>;
}

/** As near as a click would be taken for it, screen pixels. */
const REACH_PX = 8;

async function wordsNow(store: DeskStore, source: LiveHelpSource, zoom: number): Promise<string> {
  const { shown } = source.state.getState();
  const { pointerAt, document } = store.getState();
  const at = shown?.at ?? (pointerAt === null ? null : sheetPx(...pointerAt));
  if (at === null) return text.nothing;
  const setOut = setOutOf(document);
  const thing = thingWords(store.getState(), setOut.map, at, REACH_PX / zoom);
  const place = [...(thing === null ? [] : [thing]), ...wordsOfPlace(at, document, setOut)];
  const read = await store.headAt([at[0], at[1]]);
  const head = read === null ? null : { ...read, at };
  const words =
    shown === null
      ? [...place, ...headWords(head, store.getState())]
      : helpWords({ ...shown, head: head ?? shown.head }, place, store.getState());
  return words.length === 0 ? deskViewText.pixels(at[0], at[1]) : `${words.join('. ')}.`;
}

function wordsOfPlace(at: SheetPx, document: FlowNetDocument, setOut: SetOut): string[] {
  const words = wordsAt([at[0], at[1]], document, setOut);
  // An em space between the two, in one line.
  return words === null ? [] : [`${deskViewText.elevation(words)}\u2003${deskViewText.offset(words)}`];
}

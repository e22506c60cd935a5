import { useEffect, useRef, useState } from 'react';
import { deskViewText } from '#client/text/desk-view.ts';
import { liveHelpText as text } from '#client/text/tracing-aids.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { SetOut } from '#shared/compute/set-out.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { DeskState, DeskStore } from '../model/desk-state.ts';
import type { HelpShown, LiveHelpSource } from '../model/live-help-source.ts';
import type { ViewStore } from '../model/view-store.ts';
import { sheetZoom, toScreen, type Viewport } from '../model/viewport.ts';
import { movedLayer } from '../render/moved-layer.ts';
import { onceAFrame } from '../render/once-a-frame.ts';
import { headWords, helpWords } from './live-help-words.ts';
import { setOutOf, wordsAt } from './pointer-readout.tsx';
import { thingWords } from './thing-words.ts';
import { type RowOf, writeRows } from './written-rows.ts';

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

const AWAY_PX = 18;
const LINE_PX = 18;
/** About the most that is told: by the words of the moment a box would leap from side to side under a moving hand. */
const ROOM_PX = [320, 5 * LINE_PX] as const;
/** Under the readout of the place, which a narrow sheet shows in its second row; a finger is seldom there. */
const IN_CORNER: BesidePlace = { transform: 'translate(12px, 96px)', side: 'flex-start' };
/** As many rows as a head takes: a box that grows and shrinks under a moving hand jumps, and is laid out anew. */
const AWAITED = [text.headAwaited, '\u00a0'];

const ROW: RowOf = { tag: 'p', className: 'm-0 leading-[18px]' };

function Beside({ store, views, source, touched }: LiveHelpProps) {
  const element = useRef<HTMLDivElement>(null);
  useEffect(
    () =>
      element.current === null ? undefined : keepBeside(element.current, { store, views, source, touched }),
    [store, views, source, touched],
  );
  return (
    // Said aloud at every movement it would drown everything else; Q tells it. What moves is apart from what is written, of
    // which the frame keeps its size: else the browser would lay out the page and all its layers anew in every frame.
    <div
      ref={element}
      hidden
      aria-hidden="true"
      data-live-help
      className="pointer-events-none absolute top-0 left-0 will-change-transform"
    >
      <div className="flex h-44 w-md flex-col items-start text-sm font-semibold whitespace-nowrap contain-layout contain-size">
        {/* A ground as strong as the halo of the marks: blurred shadows of letters would be painted anew in every frame. */}
        <div className="bg-film/85" />
      </div>
    </div>
  );
}

/** Keeps what is told beside the pointer written within an element, and that beside the pointer, until it is ended. */
function keepBeside(element: HTMLElement, { store, views, source, touched }: LiveHelpProps): () => void {
  const moveTo = movedLayer(element);
  const frame = onceAFrame(() => {
    const { shown } = source.state.getState();
    const words = shown === null ? [] : besideWords(store.getState(), shown, touched);
    element.hidden = words.length === 0;
    const framed = element.firstElementChild;
    const rows = framed?.firstElementChild;
    if (shown === null || words.length === 0 || !(framed instanceof HTMLElement) || !rows) return;
    writeRows(rows, ROW, words);
    const { transform, side } = touched ? IN_CORNER : besidePlace(views.getState().view, shown.at, words);
    moveTo(transform);
    framed.style.alignItems = side;
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

function besideWords(state: DeskState, shown: HelpShown, touched: boolean): string[] {
  // In the corner they stand right under the readout, which tells the place already.
  const place = touched ? [] : wordsOfPlace(shown.at, state.document, setOutOf(state.document));
  return helpWords(shown, place, state, state.reading === null ? [] : AWAITED);
}

/** `side`: at which side of the element its words stand. */
type BesidePlace = { readonly transform: string; readonly side: 'flex-start' | 'flex-end' };

/** Beside the pointer where there is room: to its right and below, else to the other side. */
function besidePlace(view: Viewport, at: SheetPx, words: readonly string[]): BesidePlace {
  const [x, y] = toScreen(view, at);
  const [width, height] = ROOM_PX;
  const flipped = x + AWAY_PX + width > view.widthPx && x - AWAY_PX - width > 0;
  const left = flipped ? `calc(${Math.round(x - AWAY_PX)}px - 100%)` : `${Math.round(x + AWAY_PX)}px`;
  const above = y + AWAY_PX + height > view.heightPx;
  const top = above ? y - AWAY_PX - words.length * LINE_PX : y + AWAY_PX;
  return {
    transform: `translate(${left}, ${Math.round(Math.max(4, top))}px)`,
    side: flipped ? 'flex-end' : 'flex-start',
  };
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

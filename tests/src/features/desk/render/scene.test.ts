import { describe, expect, it } from 'vitest';
import {
  buildDragged,
  buildScene,
  partScene,
  type SceneInput,
} from '#client/features/desk/render/build-scene.ts';
import { LABEL_HEIGHT_PX, labelWidthPx } from '#client/features/desk/render/label-layout.ts';
import { placeWords } from '#client/features/desk/render/place-words.ts';
import {
  diffScene,
  type SceneItem,
  type SceneMark,
  type SceneSink,
} from '#client/features/desk/render/scene.ts';
import { UNSAID } from '#shared/contract/document.ts';
import { documentWith, LINE_A, LINE_B, POINT_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const line = tracedLine([
  [100, 100],
  [120, 400],
]);

function inputOf(changes: Partial<SceneInput> = {}): SceneInput {
  return {
    document: documentWith({
      [LINE_A]: line,
      [LINE_B]: tracedLine([
        [200, 100],
        [210, 420],
      ]),
    }),
    preview: {},
    reading: null,
    selection: { kind: 'none', ids: [], vertex: null },
    draftId: null,
    hiddenKinds: [],
    lineWeight: 'normal',
    notes: [],
    guides: {},
    map: null,
    readOnly: false,
    zoom: 1,
    seenAs: null,
    frame: null,
    ...changes,
  };
}

/** Keeps the list a sink would paint and counts what it was told. */
function recordingSink() {
  const painted: SceneItem[] = [];
  const told: string[] = [];
  const sink: SceneSink = {
    add(item, index) {
      told.push(`add ${item.id}`);
      painted.splice(index, 0, item);
    },
    change(item) {
      told.push(`change ${item.id}`);
      painted[painted.findIndex((old) => old.id === item.id)] = item;
    },
    remove(id) {
      told.push(`remove ${id}`);
      painted.splice(
        painted.findIndex((old) => old.id === id),
        1,
      );
    },
  };
  return { painted, told, sink };
}

describe('the scene', () => {
  it('of what is dragged alone is what the whole scene has of it, and lies wholly among what is being worked on', () => {
    const moved = { ...line, points: [line.points[0]!, [150, 450] as [number, number]] };
    const input = inputOf({
      preview: { [LINE_A]: moved },
      selection: { kind: 'line', ids: [LINE_A], vertex: 1 },
    });
    const dragged = buildDragged(input);
    const ids = new Set(dragged.map(({ id }) => id));
    expect(dragged.length).toBeGreaterThan(2);
    expect(buildScene(input).filter(({ id }) => ids.has(id))).toEqual(dragged);
    expect(partScene(buildScene(input)).base.map(({ id }) => id)).toEqual([LINE_B]);
  });

  it('shows the dragged line where it is dragged to, and handles only on the chosen line', () => {
    const moved = {
      ...line,
      points: [
        [100, 100],
        [150, 450],
      ] as [number, number][],
    };
    const items = buildScene(
      inputOf({ preview: { [LINE_A]: moved }, selection: { kind: 'line', ids: [LINE_A], vertex: 1 } }),
    );
    expect(items.find((item) => item.id === LINE_A)).toMatchObject({ points: moved.points, strong: true });
    expect(items.filter((item) => item.id.startsWith('vertex')).map((item) => item.shape)).toEqual([
      'handle',
      'chosenHandle',
    ]);
  });

  it('shows no handles to those who may only look, and nothing that is hidden', () => {
    const chosen = { kind: 'line', ids: [LINE_A], vertex: null } as const;
    expect(buildScene(inputOf({ selection: chosen, readOnly: true })).map((item) => item.shape)).toEqual([
      'line',
      'line',
    ]);
    expect(buildScene(inputOf({ hiddenKinds: ['equipotential'] }))).toEqual([]);
  });

  it('leaves out a point typed in section coordinates until the section is set out', () => {
    const document = documentWith({
      [POINT_A]: {
        kind: 'readingPoint',
        ...UNSAID.readingPoint,
        name: 'P1',
        place: { on: 'section', offset: 1, elevation: 2 },
        order: 1,
      },
    });
    expect(buildScene(inputOf({ document }))).toEqual([]);
  });

  it('outlines the section where the sheet holds more than it', () => {
    const items = buildScene(inputOf({ frame: [10, 20, 300, 200] }));
    expect(items[0]).toMatchObject({
      id: 'frame',
      points: [
        [10, 20],
        [310, 20],
        [310, 220],
        [10, 220],
        [10, 20],
      ],
    });
  });

  it('tells the sink only what differs', () => {
    const before = buildScene(inputOf());
    const after = buildScene(
      inputOf({ selection: { kind: 'line', ids: [LINE_B], vertex: null }, readOnly: true }),
    );
    const { told, sink, painted } = recordingSink();
    diffScene([], before, sink);
    told.length = 0;
    diffScene(before, buildScene(inputOf({ document: inputOf().document })), sink);
    expect(told.filter((entry) => !entry.startsWith('change'))).toEqual([]);
    told.length = 0;
    diffScene(before, after, sink);
    expect(told).toEqual([`change ${LINE_B}`]);
    expect(painted.map((item) => item.id)).toEqual([LINE_A, LINE_B]);
  });

  it('arrives at the next scene from any other, in its order', () => {
    const mark = (id: string): SceneItem => ({
      id,
      shape: 'cross',
      at: [0, 0],
      text: '',
      colour: '',
      strong: false,
      offsetPx: [0, 0],
    });
    const orders = ['', 'a', 'abc', 'cab', 'bxa', 'cxbya', 'yx', 'abcxy'];
    for (const from of orders) {
      for (const to of orders) {
        const { painted, sink } = recordingSink();
        diffScene([], [...from].map(mark), sink);
        diffScene([...from].map(mark), [...to].map(mark), sink);
        expect(painted.map((item) => item.id).join('')).toBe(to);
      }
    }
  });
});

describe('words on the sheet', () => {
  it('give way to points, their names and the notes', () => {
    const label: SceneMark = {
      id: 'label a',
      shape: 'label',
      at: [500, 400],
      text: '112.00',
      colour: '',
      strong: false,
      offsetPx: [0, 0],
    };
    const point: SceneItem = { ...label, id: 'P3', text: 'P3', shape: 'readingPoint', at: [500, 416] };
    const { items } = placeWords([label, point], 1);
    const placed = items.find(({ id }) => id === 'label a');
    expect(placed !== undefined && 'offsetPx' in placed ? placed.offsetPx : null).not.toEqual([0, 16]);
  });
});

describe('guides over the sheet', () => {
  const corner: Array<[number, number]> = [
    [0, 0],
    [50, 0],
    [50, 50],
  ];
  const guides = {
    explanation: {
      areas: [{ id: 'strip', tone: 'strip' as const, outlines: [corner] }],
      lines: [{ id: 'before', tone: 'way' as const, points: corner }],
      marks: [],
    },
    computedNet: {
      areas: [],
      lines: [{ id: '1', tone: 'computedFlowLine' as const, points: corner }],
      marks: [],
    },
  };

  it('lie under the net when they tint or compare, over it when they explain', () => {
    const ids = buildScene(inputOf({ guides })).map(({ id }) => id);
    const placeOf = (id: string) => ids.indexOf(id);
    expect(placeOf('explanation area strip')).toBeLessThan(placeOf(LINE_A));
    expect(placeOf('computedNet line 1')).toBeLessThan(placeOf(LINE_A));
    expect(placeOf('computedNet line 1')).toBeGreaterThanOrEqual(0);
    expect(placeOf('explanation line before')).toBeGreaterThan(placeOf(LINE_B));
  });

  it('are painted again only when they have changed', () => {
    const { sink, told } = recordingSink();
    const input = inputOf({ guides });
    const before = buildScene(input);
    diffScene([], before, sink);
    told.length = 0;
    diffScene(before, buildScene({ ...input }), sink);
    expect(told).toEqual([]);
    const strip = { ...guides.explanation.areas[0]!, outlines: [[...corner].reverse()] };
    const moved = { ...guides, explanation: { ...guides.explanation, areas: [strip] } };
    diffScene(before, buildScene({ ...input, guides: moved }), sink);
    expect(told).toEqual(['change explanation area strip']);
  });

  it('say their words beside a doubtful place, not over its mark', () => {
    const at: [number, number] = [300, 300];
    const finding = { code: 'anglesNotSquare', weight: 'question', text: '', cell: null, entityIds: [], at };
    const reading = { findings: [finding], lines: [] } as unknown as SceneInput['reading'];
    const marks = [{ id: 'angle', tone: 'poorAngle' as const, at, text: '71°' }];
    const items = buildScene(inputOf({ reading, guides: { netCheck: { areas: [], lines: [], marks } } }));
    const callout = items.find(({ id }) => id === 'netCheck mark angle');
    if (callout === undefined || !('offsetPx' in callout)) throw new Error('The angle has no words.');
    const [dx, dy] = callout.offsetPx;
    // The mark's ring and question mark take 20 px across and reach 24 px up and 10 px down.
    const clearAcross = Math.abs(dx) - labelWidthPx('71°') / 2 >= 10;
    const clearUpOrDown = dy - LABEL_HEIGHT_PX / 2 >= 10 || dy + LABEL_HEIGHT_PX / 2 <= -24;
    expect(clearAcross || clearUpOrDown).toBe(true);
    expect(Math.hypot(dx, dy)).toBeLessThan(60);
  });
});

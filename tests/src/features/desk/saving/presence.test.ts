import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { presenceGuides, presenceSentence } from '#client/features/desk/components/presence-words.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { startPresence } from '#client/features/desk/saving/presence.ts';
import type { PresenceBeat, PresentDesk } from '#shared/contract/presence.ts';
import { documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const OWN = '00000000-0000-7000-8000-0000000000c1';
const REMI: PresentDesk = {
  clientId: '00000000-0000-7000-8000-0000000000c2',
  person: { id: '00000000-0000-7000-8000-0000000000ff', name: 'Remi Okafor' },
  tool: 'select',
  entityId: LINE_A,
};
const line = tracedLine([
  [0, 0],
  [10, 10],
  [20, 20],
]);
const document = documentWith({ [LINE_A]: line });

beforeEach(() => void vi.useFakeTimers());
afterEach(() => void vi.useRealTimers());

function open() {
  const beats: PresenceBeat[] = [];
  const left: number[] = [];
  const connection = { online: true };
  const desk = createDeskStore({ document });
  const own: PresentDesk = { ...REMI, clientId: OWN };
  const answer = async () => {
    if (!connection.online) throw new Error('no connection');
    return { desks: [own, REMI] };
  };
  const api = {
    beat: (told: PresenceBeat) => {
      beats.push(told);
      return answer();
    },
    present: answer,
    leave: async () => void left.push(Date.now()),
  };
  return { desk, beats, left, connection, presence: startPresence(desk, OWN, api, Date.now) };
}

describe('the presence of a desk', () => {
  it('is told at once, every five seconds, and soon after something else is taken up', async () => {
    const { desk, beats } = open();
    await vi.advanceTimersByTimeAsync(10_100);
    expect(beats).toHaveLength(3);
    desk.setTool('equipotential');
    desk.setTool('select');
    desk.select({ kind: 'line', ids: [LINE_A] });
    await vi.advanceTimersByTimeAsync(300);
    expect(beats.slice(3)).toEqual([{ tool: 'select', entityId: LINE_A }]);
  });

  it('knows the others and not itself, and nobody once no answer has come for a while', async () => {
    const { presence, connection } = open();
    await vi.advanceTimersByTimeAsync(0);
    expect(presence.others.getState()).toEqual([REMI]);
    connection.online = false;
    await vi.advanceTimersByTimeAsync(25_000);
    expect(presence.others.getState()).toEqual([]);
    connection.online = true;
    await vi.advanceTimersByTimeAsync(5000);
    expect(presence.others.getState()).toEqual([REMI]);
  });

  it('ends while nobody looks and when the desk is left, once each', async () => {
    const { presence, beats, left } = open();
    await vi.advanceTimersByTimeAsync(0);
    presence.setAway(true);
    await vi.advanceTimersByTimeAsync(60_000);
    expect([beats.length, left.length]).toEqual([1, 1]);
    presence.setAway(false);
    await vi.advanceTimersByTimeAsync(0);
    presence.stop();
    presence.stop();
    await vi.advanceTimersByTimeAsync(60_000);
    expect([beats.length, left.length]).toEqual([2, 2]);
  });
});

describe('what somebody has in hand', () => {
  const shown = { document, reading: null };

  it('is said in words: the line, else the tool, else that they look', () => {
    expect(presenceSentence(REMI, 'R. Okafor', shown)).toBe('R. Okafor is on equipotential');
    expect(presenceSentence({ ...REMI, entityId: null, tool: 'flowLine' }, 'R. Okafor', shown)).toBe(
      'R. Okafor has the tool in hand: Flow line',
    );
    expect(presenceSentence({ ...REMI, entityId: OWN, tool: 'of tomorrow' }, 'R. Okafor', shown)).toBe(
      'R. Okafor is looking',
    );
  });

  it('is marked on the sheet with the name, and not where it is no longer there', () => {
    expect(presenceGuides([REMI], shown, null)).toMatchObject({
      lines: [{ points: line.points }],
      marks: [{ at: [10, 10], text: 'R. Okafor' }],
    });
    expect(presenceGuides([{ ...REMI, entityId: OWN }], shown, null)).toBeNull();
  });
});

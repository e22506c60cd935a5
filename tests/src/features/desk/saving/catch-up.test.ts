import { describe, expect, it } from 'vitest';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { createCatchUp } from '#client/features/desk/saving/catch-up.ts';
import type { ChangesDto } from '#shared/contract/nets.ts';
import { documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const lineTo = (x: number) =>
  tracedLine([
    [0, 0],
    [x, x],
  ]);
const change = (number: number): ChangesDto => ({
  changeNumber: number,
  entities: [{ id: LINE_A, version: number + 1, value: lineTo(number), changedBy: null, clientId: null }],
});

function deskAt(changeNumber: number) {
  return createDeskStore({ document: documentWith({ [LINE_A]: lineTo(0) }), changeNumber });
}

describe('catching up with others', () => {
  it('asks for what came after the newest change it holds', async () => {
    const desk = deskAt(4);
    const asked: number[] = [];
    const catchUp = createCatchUp(desk, async (since) => {
      asked.push(since);
      return change(since + 1);
    });
    await catchUp();
    await catchUp();
    expect(asked).toEqual([4, 5]);
    expect(desk.getState().document.entities[LINE_A]?.value).toEqual(lineTo(6));
  });

  it('asks once more, not once for each, when calls come while it is asking', async () => {
    const desk = deskAt(0);
    let answer: (changes: ChangesDto) => void = () => {};
    let asked = 0;
    const catchUp = createCatchUp(desk, () => {
      asked += 1;
      return new Promise((resolve) => {
        answer = resolve;
      });
    });
    const first = catchUp();
    const others = [catchUp(), catchUp(), catchUp()];
    answer(change(1));
    await new Promise((resolve) => setTimeout(resolve));
    answer(change(2));
    await Promise.all([first, ...others]);
    expect(asked).toBe(2);
    expect(desk.getState().changeNumber).toBe(2);
  });

  it('starts from the same number after a question that failed', async () => {
    const desk = deskAt(7);
    const asked: number[] = [];
    const catchUp = createCatchUp(desk, async (since) => {
      asked.push(since);
      if (asked.length === 1) throw new Error('no connection');
      return change(8);
    });
    await expect(catchUp()).rejects.toThrow('no connection');
    await catchUp();
    expect(asked).toEqual([7, 7]);
  });
});

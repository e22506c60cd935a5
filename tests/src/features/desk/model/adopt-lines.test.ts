import { describe, expect, it } from 'vitest';
import {
  adoptableOfGuide,
  adoptLines,
  isAdopted,
  isSolvedAlike,
  traced,
} from '#client/features/desk/model/adopt-lines.ts';
import { computedNetGuides } from '#client/features/desk/model/check-guides.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { adoptableLines } from '#shared/compute/beside/adopted-lines.ts';
import { type BesideSolution, besideSolution } from '#shared/compute/beside/beside-solution.ts';
import { sectionOfDocument } from '#shared/compute/independent/section-of-document.ts';
import { solveSection } from '#shared/compute/independent/solve-section.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;
const readings = [
  { at: net.placeAt(4.4, 1.1), clicked: true },
  { at: net.placeAt(2.7, 0.6), clicked: true },
];
const drawn = exactNetDocument(net, { pxPerUnit, readings });

function solved(document: FlowNetDocument): BesideSolution {
  const section = sectionOfDocument(document);
  if (!section.ok) throw new Error(section.text);
  const solution = solveSection(section.problem);
  if (!solution.ok) throw new Error(solution.text);
  return besideSolution(document, readNet(document), section, solution)!;
}

const beside = solved(drawn);
const lines = adoptableLines(beside.net);
const equipotentials = lines.filter(({ kind }) => kind === 'equipotential');
const opened = () => createDeskStore({ document: drawn });
const adoptedIn = (document: FlowNetDocument) =>
  entitiesOf(document, 'line').filter(({ value }) => value.origin === 'adopted');

describe('adopting lines of the computed net', () => {
  it('takes the place of the traced ones in one step, and the net is read from them as the solution has it', () => {
    const store = opened();
    adoptLines(store, equipotentials, 'equipotential');
    const { document } = store.getState();
    expect(traced(document, 'equipotential')).toEqual([]);
    expect(adoptedIn(document)).toHaveLength(equipotentials.length);
    expect(equipotentials.every((line) => isAdopted(document, line))).toBe(true);
    const reading = readNet(document);
    expect(reading.state).toBe('read');
    // Agreement by construction: the field between adopted lines is the solution's own.
    const heads = new Map(beside.comparison.points.map(({ id, independent }) => [id, independent]));
    for (const point of reading.points) {
      expect(Math.abs(point.totalHead! - heads.get(point.id)!)).toBeLessThan(0.02 * beside.net.dropHead);
    }
    store.undo();
    expect(store.getState().document.entities).toEqual(drawn.entities);
  });

  it('adds one line, once', () => {
    const store = opened();
    adoptLines(store, [equipotentials[2]!]);
    adoptLines(store, [equipotentials[2]!]);
    expect(adoptedIn(store.getState().document)).toHaveLength(1);
    expect(isAdopted(store.getState().document, equipotentials[2]!)).toBe(true);
    expect(isAdopted(store.getState().document, equipotentials[3]!)).toBe(false);
  });

  it('changes nothing on a net that may only be looked at', () => {
    const store = createDeskStore({ document: drawn }, { readOnly: true });
    expect(adoptLines(store, equipotentials).ok).toBe(false);
    expect(adoptedIn(store.getState().document)).toEqual([]);
  });

  it('knows a line by its guide over the sheet', () => {
    for (const { id } of computedNetGuides(beside).lines) {
      const line = adoptableOfGuide(lines, id)!;
      expect(id.startsWith(line.kind === 'phreaticLine' ? 'surface' : line.kind)).toBe(true);
    }
    expect(adoptableOfGuide(lines, 'strip')).toBeNull();
  });

  it('leaves the solution in force, which a changed level or boundary does not', () => {
    const store = opened();
    adoptLines(store, equipotentials, 'equipotential');
    expect(isSolvedAlike(drawn, store.getState().document, false)).toBe(true);
    const [face] = entitiesOf(drawn, 'line').filter(({ value }) => value.line === 'impervious');
    const points = face!.value.points.map(([x, y]): [number, number] => [x, y + 1]);
    store.run('moved', [{ op: 'put', entityId: face!.id, value: { ...face!.value, points } }]);
    expect(isSolvedAlike(drawn, store.getState().document, false)).toBe(false);
  });
});

import { describe, expect, it } from 'vitest';
import { activityFiltersIn, eventFilterOf } from '#client/features/activity/model/activity-filters.ts';

const PERSON = '019a3c00-0000-7000-8000-00000000000a';
const read = (address: string) => activityFiltersIn(new URLSearchParams(address));

describe('the filters of an activity', () => {
  it('are what the address says as far as it can be', () => {
    expect(read('')).toEqual({});
    expect(read('person=me&about=weather&from=3.4.2026&to=2026-02-31')).toEqual({});
    const filters = { person: PERSON, about: 'notes', from: '2026-03-01', to: '2026-03-02' };
    expect(read(new URLSearchParams(filters).toString())).toEqual(filters);
  });

  it('are days of the reader, both whole, also where a clock is put forward or back', () => {
    expect(eventFilterOf({})).toEqual({});
    for (const day of ['2026-03-29', '2026-07-01', '2026-10-25', '2026-12-31']) {
      const { from, until } = eventFilterOf({ from: day, to: day });
      const [first, next] = [new Date(from ?? ''), new Date(until ?? '')];
      expect([first.getHours(), first.getMinutes(), next.getHours(), next.getMinutes()]).toEqual([
        0, 0, 0, 0,
      ]);
      expect(Math.round((next.getTime() - first.getTime()) / 3_600_000 / 24)).toBe(1);
      expect(first.getDate()).toBe(Number(day.slice(-2)));
    }
  });
});

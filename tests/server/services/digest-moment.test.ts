import { describe, expect, it } from 'vitest';
import { dayInWords, isTimeZone, nextDigestMoment } from '#server/services/digest-moment.ts';

const next = (now: string, zone: string) => nextDigestMoment(new Date(now), zone).toISOString();

describe('the hour of the digest', () => {
  it('is the next seven o’clock where the reader is', () => {
    expect(next('2026-12-01T05:59:59Z', 'Europe/Vienna')).toBe('2026-12-01T06:00:00.000Z');
    expect(next('2026-12-01T06:00:00Z', 'Europe/Vienna')).toBe('2026-12-02T06:00:00.000Z');
    expect(next('2026-12-01T14:59:00Z', 'America/Los_Angeles')).toBe('2026-12-01T15:00:00.000Z');
    // Already the next day there.
    expect(next('2026-12-01T20:00:00Z', 'Asia/Kolkata')).toBe('2026-12-02T01:30:00.000Z');
    expect(next('2026-12-31T23:30:00Z', 'UTC')).toBe('2027-01-01T07:00:00.000Z');
  });

  it('stays seven o’clock over the nights on which clocks are changed', () => {
    // 29 March 2026 at 02:00 and 25 October 2026 at 03:00 in Vienna.
    expect(next('2026-03-28T12:00:00Z', 'Europe/Vienna')).toBe('2026-03-29T05:00:00.000Z');
    expect(next('2026-10-24T12:00:00Z', 'Europe/Vienna')).toBe('2026-10-25T06:00:00.000Z');
    // 1 November 2026 at 02:00 in New York.
    expect(next('2026-11-01T04:00:00Z', 'America/New_York')).toBe('2026-11-01T12:00:00.000Z');
  });

  it('lies on the day after on an island that skipped a day', () => {
    // Apia went from 29 to 31 December 2011.
    expect(next('2011-12-30T09:00:00Z', 'Pacific/Apia')).toBe('2011-12-30T17:00:00.000Z');
  });
});

describe('a time zone', () => {
  it('is one that this server knows', () => {
    expect(['UTC', 'Europe/Vienna', 'Etc/GMT+5'].every(isTimeZone)).toBe(true);
    expect(['', 'Nowhere/Land', 'tomorrow'].some(isTimeZone)).toBe(false);
  });

  it('says which day it is', () => {
    expect(dayInWords(new Date('2026-12-01T23:30:00Z'), 'Europe/Vienna')).toBe('2 December 2026');
    expect(dayInWords(new Date('2026-12-01T23:30:00Z'), 'America/New_York')).toBe('1 December 2026');
  });
});

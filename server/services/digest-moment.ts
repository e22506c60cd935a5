import { DIGEST_HOUR } from '#shared/contract/mails.ts';

const HOUR_MS = 60 * 60 * 1000;

/** Whether a name of a time zone is one that this server knows. */
export function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}

/**
 * The next moment after `now` at which clocks in a time zone (IANA name) show the digest's hour. On a day whose clocks
 * skip that hour it is the moment an hour further.
 */
export function nextDigestMoment(now: Date, timeZone: string): Date {
  for (let days = 0; ; days += 1) {
    const moment = momentOf(dayShown(now, timeZone) + days * 24 * HOUR_MS + DIGEST_HOUR * HOUR_MS, timeZone);
    if (moment > now) return moment;
  }
}

/** A day in a time zone in words, as letters write it. */
export const dayInWords = (at: Date, timeZone: string): string =>
  new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone }).format(at);

/** What clocks in the zone show, as if it were UTC. */
function clockShown(at: Date, timeZone: string): number {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  }).formatToParts(at);
  const of = (type: Intl.DateTimeFormatPartTypes) => Number(parts.find((part) => part.type === type)?.value);
  return Date.UTC(of('year'), of('month') - 1, of('day'), of('hour'), of('minute'), of('second'));
}

const dayShown = (at: Date, timeZone: string): number => {
  const shown = new Date(clockShown(at, timeZone));
  return Date.UTC(shown.getUTCFullYear(), shown.getUTCMonth(), shown.getUTCDate());
};

/** When clocks show a time; the offset is looked up again where it changes between guess and answer. */
function momentOf(shown: number, timeZone: string): Date {
  let moment = shown;
  for (let round = 0; round < 2; round += 1)
    moment = shown - (clockShown(new Date(moment), timeZone) - moment);
  return new Date(moment);
}

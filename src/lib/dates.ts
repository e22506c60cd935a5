import { agoText as text } from '#client/text/dates.ts';
import { localeStore } from './locale.ts';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;

const isSameYear = (a: Date, b: Date) => a.getFullYear() === b.getFullYear();
const isSameDay = (a: Date, b: Date) =>
  isSameYear(a, b) && a.getMonth() === b.getMonth() && a.getDate() === b.getDate();

/** The month is always named: 3.4. and 4/3 are the same day to nobody. */
const DAY = { day: 'numeric', month: 'short' } as const;
const FULL_DAY = { ...DAY, year: 'numeric' } as const;
const CLOCK = { hour: '2-digit', minute: '2-digit' } as const;

const formats = new Map<string, Intl.DateTimeFormat>();

/** Formats are dear to make, and lists show hundreds of dates. */
function formatted(at: Date, options: Intl.DateTimeFormatOptions): string {
  const { tag } = localeStore.getState();
  const key = `${tag} ${Object.keys(options).join()}`;
  const known = formats.get(key);
  const format =
    known ?? new Intl.DateTimeFormat(tag, { calendar: 'gregory', numberingSystem: 'latn', ...options });
  if (known === undefined) formats.set(key, format);
  return format.format(at);
}

/** "28 Nov" in the present year, "28 Nov 2025" otherwise, in the order of the person's locale; their time zone. */
export function formatDay(iso: string, now: Date = new Date()): string {
  const at = new Date(iso);
  return formatted(at, isSameYear(at, now) ? DAY : FULL_DAY);
}

/** "28 Nov 2026", for records. */
export const formatFullDay = (iso: string): string => formatted(new Date(iso), FULL_DAY);

/** "10:42", the reader's time zone. */
export const formatTime = (iso: string): string => formatted(new Date(iso), CLOCK);

/** "28 Nov 2026, 10:42", for records and for the title of a relative time. */
export const formatMoment = (iso: string): string => `${formatFullDay(iso)}, ${formatTime(iso)}`;

/** "just now", "12 min ago", "2 h ago", "yesterday", "28 Nov". */
export function formatAgo(iso: string, now: Date = new Date()): string {
  const at = new Date(iso);
  const past = now.getTime() - at.getTime();
  if (past < MINUTE) return text.justNow;
  if (past < HOUR) return text.minutes(Math.floor(past / MINUTE));
  if (past < 12 * HOUR || isSameDay(at, now)) return text.hours(Math.floor(past / HOUR));
  if (isSameDay(at, new Date(now.getTime() - 24 * HOUR))) return text.yesterday;
  return formatDay(iso, now);
}

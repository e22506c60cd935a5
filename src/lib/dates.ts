const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short' });
const dayAndYear = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric' });
const clock = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' });

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;

const isSameYear = (a: Date, b: Date) => a.getFullYear() === b.getFullYear();
const isSameDay = (a: Date, b: Date) =>
  isSameYear(a, b) && a.getMonth() === b.getMonth() && a.getDate() === b.getDate();

/** "28 Nov" in the present year, "28 Nov 2025" otherwise; the reader's time zone. */
export function formatDay(iso: string, now: Date = new Date()): string {
  const at = new Date(iso);
  return (isSameYear(at, now) ? day : dayAndYear).format(at);
}

/** "28 Nov 2026", for records. */
export const formatFullDay = (iso: string): string => dayAndYear.format(new Date(iso));

/** "10:42", the reader's time zone. */
export const formatTime = (iso: string): string => clock.format(new Date(iso));

/** "28 Nov 2026, 10:42", for records and for the title of a relative time. */
export const formatMoment = (iso: string): string => `${formatFullDay(iso)}, ${formatTime(iso)}`;

/** "just now", "12 min ago", "2 h ago", "yesterday", "28 Nov". */
export function formatAgo(iso: string, now: Date = new Date()): string {
  const at = new Date(iso);
  const past = now.getTime() - at.getTime();
  if (past < MINUTE) return 'just now';
  if (past < HOUR) return `${Math.floor(past / MINUTE)} min ago`;
  if (past < 12 * HOUR || isSameDay(at, now)) return `${Math.floor(past / HOUR)} h ago`;
  if (isSameDay(at, new Date(now.getTime() - 24 * HOUR))) return 'yesterday';
  return formatDay(iso, now);
}
